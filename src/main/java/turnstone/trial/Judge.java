package turnstone.trial;

import java.util.List;
import java.util.Locale;
import turnstone.plant.Duty;

/**
 * Holds a trial against what the plant's duties demand.
 *
 * <p>Each absolute requirement takes its figure in the form that it names ({@code tray} not seen, or {@code machine} not seen as well), at its
 * point or at the lower end of its two-sided interval. With something in service the gain is added to every duty, see {@link Gain}. Guards and
 * limits follow. What cannot be judged is not met, and says what would let it be judged.
 */
public final class Judge {
    private Judge() {}

    /** The verdict on these duties. */
    public static Verdict verdict(TrialResult trial, List<Duty> duties) {
        List<DutyVerdict> verdicts = duties.stream()
                .map(duty -> new DutyJudge(trial, duty).verdict())
                .toList();
        boolean release =
                !verdicts.isEmpty() && verdicts.stream().allMatch(verdict -> verdict.decision() == Decision.RELEASE);
        return new Verdict(
                release ? Decision.RELEASE : Decision.HOLD,
                mainReason(verdicts),
                verdicts,
                trial.days(),
                trial.showings().size(),
                trial.candidate(),
                trial.inService());
    }

    private static String mainReason(List<DutyVerdict> verdicts) {
        if (verdicts.isEmpty()) {
            return "the plant file names no duty, so there is nothing to release for; write one to have it judged";
        }
        DutyVerdict main = verdicts.stream()
                .filter(verdict -> verdict.decision() == Decision.HOLD)
                .findFirst()
                .orElse(verdicts.get(0));
        return main.name() + ": " + main.mainReason();
    }

    /** {@code 95} or {@code 97.5}. */
    static String percent(double share) {
        return String.format(Locale.ROOT, "%.4g %%", 100 * share)
                .replaceFirst("\\.?0+ %", " %")
                .replace(" %", "");
    }
}
