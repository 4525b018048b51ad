package turnstone.cli;

import java.util.ArrayList;
import java.util.List;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import turnstone.fault.Fault;
import turnstone.measure.TailSpec;
import turnstone.measure.TailSpec.Bins;
import turnstone.measure.TailSpec.Mask;
import turnstone.measure.TailSpec.SavitzkyGolay;
import turnstone.measure.TailSpec.Step;

/**
 * A pretreatment tail as it is written on the command line: {@code none}, or steps with commas between, in their order:
 * {@code savitzky-golay:WINDOW/ORDER/DERIVATIVE}, {@code bins:WIDTH}, {@code mask:FIRST-LAST} with channels counted from 1.
 */
final class TailText {
    private static final Pattern SMOOTHING = Pattern.compile("savitzky-golay:(\\d{1,4})/(\\d{1,2})/(\\d{1,2})");
    private static final Pattern BINS = Pattern.compile("bins:(\\d{1,4})");
    private static final Pattern MASK = Pattern.compile("mask:(\\d{1,5})-(\\d{1,5})");

    private TailText() {}

    /**
     * Reads a tail.
     *
     * @throws Fault of kind usage, naming the step
     */
    static TailSpec read(String text) {
        if (text.equals("none")) {
            return TailSpec.none();
        }
        List<Step> steps = new ArrayList<>();
        for (String step : text.split(",", -1)) {
            steps.add(step(step.strip()));
        }
        return new TailSpec(steps);
    }

    private static Step step(String text) {
        Matcher smoothing = SMOOTHING.matcher(text);
        if (smoothing.matches()) {
            return new SavitzkyGolay(number(smoothing, 1), number(smoothing, 2), number(smoothing, 3));
        }
        Matcher bins = BINS.matcher(text);
        if (bins.matches()) {
            return new Bins(number(bins, 1));
        }
        Matcher mask = MASK.matcher(text);
        if (mask.matches()) {
            return new Mask(number(mask, 1) - 1, number(mask, 2) - 1);
        }
        throw Fault.usage("not a step of a tail")
                .at("--tail")
                .found(text)
                .expected("savitzky-golay:WINDOW/ORDER/DERIVATIVE, bins:WIDTH, mask:FIRST-LAST, or none alone");
    }

    private static int number(Matcher matcher, int group) {
        return Integer.parseInt(matcher.group(group));
    }
}
