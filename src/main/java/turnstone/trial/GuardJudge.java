package turnstone.trial;

import java.util.Locale;
import java.util.OptionalDouble;
import turnstone.plant.Guard;
import turnstone.plant.Requirement;

/** Holds what was found against the guards of a duty. */
final class GuardJudge {
    private final NightFacts facts;
    private final Sendings candidate;
    /** Null where nothing is in service. */
    private final Sendings inService;

    GuardJudge(NightFacts facts, Sendings candidate, Sendings inService) {
        this.facts = facts;
        this.candidate = candidate;
        this.inService = inService;
    }

    RequirementResult judge(Guard guard) {
        return switch (guard.kind()) {
            case SORTER_LOSS -> inService == null ? withoutRival(guard) : sorterLoss(guard);
            case PURITY_LOSS -> inService == null ? withoutRival(guard) : purityLoss(guard);
            case SHOWINGS -> judged(guard, leastShowings(), "point", "");
            default -> fact(guard);
        };
    }

    private RequirementResult withoutRival(Guard guard) {
        return judged(guard, 0, "point", "nothing is in service, so nothing can be lost against it");
    }

    private RequirementResult fact(Guard guard) {
        OptionalDouble found = facts.of(guard.kind());
        return found.isPresent()
                ? judged(guard, found.getAsDouble(), "point", "")
                : notJudged(guard, "point", "the night did not find it out; " + remedy(guard.kind()));
    }

    private static String remedy(Guard.Kind kind) {
        return switch (kind) {
            case BOARD_LOSS -> "a trial that runs the board's integer form gives it";
            case DAYS_SINCE_RELEASE -> "it needs an earlier release in the journal";
            case PRINCIPAL_ANGLE -> "it needs something in service with the same channels";
            case RECIPROCAL_CONDITION -> "a candidate that was fitted gives it";
            default -> "a day that was posted gives it";
        };
    }

    private double leastShowings() {
        return candidate.parts().stream()
                .mapToInt(part -> part.showings().size())
                .min()
                .orElse(0);
    }

    private RequirementResult purityLoss(Guard guard) {
        Estimate difference =
                FleetError.difference(Requirement.Figure.DECISION_PURITY, candidate, inService, twoSided(guard));
        return loss(guard, difference, "");
    }

    /** The sorter that may have lost most; bounds are taken for one sorter at a time. */
    private RequirementResult sorterLoss(Guard guard) {
        RequirementResult worst = null;
        for (String sorter : candidate.sorters()) {
            Sendings ours = candidate.onlySorter(sorter);
            Sendings theirs = inService.onlySorter(sorter);
            Estimate difference =
                    FleetError.difference(Requirement.Figure.DECISION_RECOVERY, ours, theirs, twoSided(guard));
            RequirementResult one = loss(guard, difference, "on " + sorter);
            if (one.found().isEmpty()) {
                return notJudged(guard, one.bound(), sorter + ": " + one.why());
            }
            if (worst == null || one.found().getAsDouble() > worst.found().orElseThrow()) {
                worst = one;
            }
        }
        return worst == null ? notJudged(guard, "point", "no sorter of the duty was shown anything") : worst;
    }

    private static double twoSided(Guard guard) {
        return 2 * guard.confidence() - 1;
    }

    private RequirementResult loss(Guard guard, Estimate difference, String where) {
        boolean point = guard.bound() == Requirement.Bound.POINT;
        String bound = point
                ? "point"
                : String.format(Locale.ROOT, "one-sided %s %% upper bound", Judge.percent(guard.confidence()));
        OptionalDouble end = point ? difference.point() : difference.lower();
        return end.isPresent()
                ? judged(guard, 0 - end.getAsDouble(), bound, where)
                : notJudged(guard, bound, difference.note());
    }

    private static RequirementResult judged(Guard guard, double found, String bound, String why) {
        return RequirementResult.judged(guard.name(), found, guard.limit(), demand(guard), unit(guard), bound, why);
    }

    private static RequirementResult notJudged(Guard guard, String bound, String why) {
        return RequirementResult.notJudged(guard.name(), guard.limit(), demand(guard), unit(guard), bound, why);
    }

    private static RequirementResult.Demand demand(Guard guard) {
        return guard.kind().side() == Guard.Side.MOST
                ? RequirementResult.Demand.AT_MOST
                : RequirementResult.Demand.AT_LEAST;
    }

    private static RequirementResult.Unit unit(Guard guard) {
        return switch (guard.kind().unit()) {
            case SHARE -> RequirementResult.Unit.SHARE;
            case DIFFERENCE -> RequirementResult.Unit.DIFFERENCE;
            case NUMBER -> RequirementResult.Unit.NUMBER;
            case DEGREES -> RequirementResult.Unit.DEGREES;
            case DAYS -> RequirementResult.Unit.DAYS;
        };
    }
}
