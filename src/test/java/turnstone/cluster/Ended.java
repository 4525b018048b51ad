package turnstone.cluster;

/** What a process left behind: its exit code, its standard output and its standard error. */
record Ended(int exitCode, String out, String talk) {}
