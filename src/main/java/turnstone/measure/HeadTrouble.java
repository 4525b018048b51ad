package turnstone.measure;

/**
 * Why the last quarantined record was turned away: reason, channel, value and limit. One per thread, written over by each quarantine.
 *
 * <p>Channels are 0-based here and counted from 1 in {@link #message}; −1 where no channel is to blame.
 */
public final class HeadTrouble {
    private QuarantineReason reason;
    private int channel = -1;
    private double value = Double.NaN;
    private double limit = Double.NaN;

    /** Sets all four. */
    public void set(QuarantineReason newReason, int newChannel, double newValue, double newLimit) {
        reason = newReason;
        channel = newChannel;
        value = newValue;
        limit = newLimit;
    }

    /** The reason, or null before the first quarantine. */
    public QuarantineReason reason() {
        return reason;
    }

    /** The first channel to blame (of the raw record; of the head's output for off scale), or −1. */
    public int channel() {
        return channel;
    }

    /** The value found; an age in milliseconds for a stale reference, infinite where there is none at all. */
    public double value() {
        return value;
    }

    /** The limit it broke, or NaN. */
    public double limit() {
        return limit;
    }

    /** One phrase for a person. */
    public String message() {
        StringBuilder text = new StringBuilder(reason == null ? "accepted" : reason.label());
        if (channel >= 0) {
            text.append(", channel ").append(channel + 1);
        }
        if (!Double.isNaN(value) || reason == QuarantineReason.NON_FINITE) {
            text.append(", found ").append(DecimalText.shortest(value));
        }
        if (!Double.isNaN(limit)) {
            text.append(", limit ").append(DecimalText.shortest(limit));
        }
        return text.toString();
    }
}
