package turnstone.measure;

import java.io.Serializable;
import java.math.BigDecimal;
import java.util.Objects;
import turnstone.fault.Fault;

/**
 * How one channel is counted: q = rint((x − offset)/step).
 *
 * @param offset the value of count 0, a decimal as written
 * @param step the value between neighbouring counts, a decimal as written, above 0
 * @param precision how many counts there are
 */
public record ChannelScale(BigDecimal offset, BigDecimal step, Precision precision) implements Serializable {
    /** Checks the numbers and takes trailing zeros off: 0.10 and 0.1 are one scale. */
    public ChannelScale {
        Objects.requireNonNull(precision, "precision");
        offset = plain(offset);
        step = plain(step);
        if (step.signum() <= 0 || step.doubleValue() < Double.MIN_NORMAL || Double.isInfinite(step.doubleValue())) {
            throw Fault.usage("the step of a count scale must be above 0")
                    .found(step)
                    .expected("a decimal such as 0.001");
        }
        if (Double.isInfinite(offset.doubleValue())) {
            throw Fault.usage("the offset of a count scale must be finite").found(offset);
        }
    }

    private static BigDecimal plain(BigDecimal value) {
        return value.signum() == 0 ? BigDecimal.ZERO : value.stripTrailingZeros();
    }
}
