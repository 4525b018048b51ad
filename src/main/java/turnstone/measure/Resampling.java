package turnstone.measure;

/** Whether records have to be brought to the plant's wavelength axis. */
public enum Resampling {
    /** Each instrument has its own wavelength table. */
    FROM_INSTRUMENT,
    /** Records are on the plant's axis already. */
    NONE
}
