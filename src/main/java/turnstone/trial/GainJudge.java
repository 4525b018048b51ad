package turnstone.trial;

import java.util.Locale;
import java.util.OptionalDouble;
import turnstone.plant.GainRule;

/** Holds a gain against its rule, and says what the trial could have shown. */
final class GainJudge {
    /** Gains are spoken of in points. */
    private static final double POINT = 0.01;

    private final GainRule rule;
    private final Gain gain;

    GainJudge(GainRule rule, Gain gain) {
        this.rule = rule;
        this.gain = gain;
    }

    static String name(String figure) {
        return "gain in " + figure + ", lower bound";
    }

    static String bound(GainRule rule) {
        return String.format(Locale.ROOT, "one-sided %s %% lower bound", Judge.percent(rule.confidence()));
    }

    RequirementResult result() {
        String name = name(gain.figure());
        if (isTooFew()) {
            return notJudged(name, tooFew());
        }
        if (gain.lower().isEmpty()) {
            return notJudged(name, gain.note());
        }
        double lower = gain.lower().getAsDouble();
        String why = "found " + VerdictText.points(gain.point().orElseThrow()) + "; " + power();
        if (lower <= rule.above()) {
            why = (gain.point().orElseThrow() > rule.above() ? "not shown: " + moreNights() : "no gain was found")
                    + "; " + why;
        }
        return RequirementResult.judged(
                name,
                lower,
                rule.above(),
                RequirementResult.Demand.ABOVE,
                RequirementResult.Unit.DIFFERENCE,
                bound(rule),
                why);
    }

    private RequirementResult notJudged(String name, String why) {
        return RequirementResult.notJudged(
                name,
                rule.above(),
                RequirementResult.Demand.ABOVE,
                RequirementResult.Unit.DIFFERENCE,
                bound(rule),
                why);
    }

    private boolean isTooFew() {
        return gain.days() < rule.days() || gain.sorters() < rule.sorters() || gain.showings() < showingsNeeded();
    }

    private int showingsNeeded() {
        return rule.days() * rule.sorters() * rule.showings();
    }

    /** What is missing, and about how long it takes. */
    private String tooFew() {
        String size = String.format(
                Locale.ROOT,
                "found %s, %s and %s of the material with the fewest; required %s, %s and %s",
                count(gain.days(), "day"),
                count(gain.sorters(), "sorter"),
                count(gain.showings(), "showing"),
                count(rule.days(), "day"),
                count(rule.sorters(), "sorter"),
                count(showingsNeeded(), "showing"));
        String soFar = gain.point().isPresent()
                ? "; so far " + VerdictText.points(gain.point().getAsDouble())
                        + (gain.standardError().isPresent() ? "; " + power() : "")
                : "";
        if (gain.sorters() < rule.sorters()) {
            return "not shown: needs " + count(rule.sorters() - gain.sorters(), "more sorter") + "; " + size + soFar;
        }
        return "not shown: needs about " + count(nightsMissing(), "more night") + "; " + size + soFar;
    }

    private int nightsMissing() {
        int missing = Math.max(1, rule.days() - gain.days());
        if (gain.days() > 0 && gain.showings() > 0) {
            double nightly = (double) gain.showings() / gain.days();
            missing = Math.max(missing, (int) Math.ceil((showingsNeeded() - gain.showings()) / nightly));
        }
        OptionalDouble nights = gain.nightsFor(rule.above());
        return nights.isPresent() ? Math.max(missing, (int) nights.getAsDouble() - gain.days()) : missing;
    }

    private String moreNights() {
        OptionalDouble nights = gain.nightsFor(rule.above());
        return nights.isPresent()
                ? "needs about " + count(Math.max(1, (int) nights.getAsDouble() - gain.days()), "more night")
                        + " if the gain stays as found"
                : "more than " + Power.MOST_NIGHTS + " nights like these would not show a gain as small as this";
    }

    /** The share of trials like this one that would have shown a true gain of one point more than required. */
    String power() {
        OptionalDouble shown = gain.power(POINT);
        return shown.isEmpty()
                ? "power not known"
                : String.format(
                        Locale.ROOT,
                        "%s of %s show a true gain of %s %.0f times in 100",
                        count(gain.days(), "night"),
                        count(gain.sorters(), "sorter"),
                        VerdictText.points(rule.above() + POINT),
                        100 * shown.getAsDouble());
    }

    private static String count(int number, String of) {
        return number + " " + of + (number == 1 ? "" : "s");
    }
}
