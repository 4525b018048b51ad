package turnstone.night;

/** What a long command says while it works; the command line decides how it looks. */
public interface Progress {
    /** A phase begins, such as {@code "fold 2026-03-13"}. */
    void phase(String name);

    /**
     * Some of the phase is done.
     *
     * @param done records so far
     * @param total records expected, or 0 where not known
     */
    void records(long done, long total);

    /** The phase has ended; {@code summary} is the line that stays. */
    void done(String summary);

    /** A line that stays, such as a remark of the fit. */
    void remark(String line);

    /** Says nothing. */
    Progress SILENT = new Progress() {
        @Override
        public void phase(String name) {}

        @Override
        public void records(long done, long total) {}

        @Override
        public void done(String summary) {}

        @Override
        public void remark(String line) {}
    };
}
