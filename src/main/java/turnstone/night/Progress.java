package turnstone.night;

/** What a long command says while it works; the command line decides how it looks. */
public interface Progress {
    /**
     * A phase begins, such as {@code "fold 2026-03-13"}.
     *
     * @param records that it will read, or 0 where that is not known
     */
    void phase(String name, long records);

    /** A phase begins that reads no records, or nobody knows how many. */
    default void phase(String name) {
        phase(name, 0);
    }

    /** So many records of the phase have been read. */
    void records(long done);

    /** The phase has ended; {@code summary} is the line that stays. */
    void done(String summary);

    /** A line that stays, such as a remark of the fit. */
    void remark(String line);

    /** Says nothing. */
    Progress SILENT = new Progress() {
        @Override
        public void phase(String name, long records) {}

        @Override
        public void records(long done) {}

        @Override
        public void done(String summary) {}

        @Override
        public void remark(String line) {}
    };
}
