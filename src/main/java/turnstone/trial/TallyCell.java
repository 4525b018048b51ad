package turnstone.trial;

import java.io.Serializable;
import java.util.Comparator;
import java.util.Objects;

/**
 * One cell of a tally: a showing, the material on its tray, the material decided, and whether the record was familiar.
 *
 * @param showing the showing's id
 * @param truth the material on the tray
 * @param decided the nearest material, or {@value #NO_SIGNAL} where the record had no signal
 * @param recognition familiar, unfamiliar or no signal
 */
public record TallyCell(String showing, String truth, String decided, Recognition recognition)
        implements Comparable<TallyCell>, Serializable {
    /** What stands for the decision of a record that was too dark to decide. */
    public static final String NO_SIGNAL = "no signal";

    private static final long serialVersionUID = 1L;
    private static final Comparator<TallyCell> ORDER = Comparator.comparing(TallyCell::showing)
            .thenComparing(TallyCell::truth)
            .thenComparing(TallyCell::decided)
            .thenComparing(TallyCell::recognition);

    /** Checks that "no signal" is said by both parts or by neither. */
    public TallyCell {
        Objects.requireNonNull(showing);
        Objects.requireNonNull(truth);
        Objects.requireNonNull(decided);
        if (decided.equals(NO_SIGNAL) != (recognition == Recognition.NO_SIGNAL)) {
            throw new IllegalArgumentException("decided " + decided + " cannot be " + recognition.label());
        }
    }

    /** The cell of a record without signal. */
    public static TallyCell noSignal(String showing, String truth) {
        return new TallyCell(showing, truth, NO_SIGNAL, Recognition.NO_SIGNAL);
    }

    @Override
    public int compareTo(TallyCell other) {
        return ORDER.compare(this, other);
    }
}
