package turnstone.cli;

import turnstone.fault.Fault;

/** Numbers of the command line, held against their range before any work. */
final class Range {
    private Range() {}

    /** Refuses what is not a share, 0 to 1. */
    static void requireShare(String option, double value) {
        if (!(value >= 0 && value <= 1)) {
            throw outside(option, Figures.shortest(value), "a share, 0 to 1");
        }
    }

    /** Refuses a negative number of axes. */
    static void requireAxes(String option, int value) {
        if (value < 0) {
            throw outside(option, Integer.toString(value), "a number of axes, or 0 for all");
        }
    }

    private static Fault outside(String option, String found, String expected) {
        return Fault.usage("out of range").at(option).found(found).expected(expected);
    }
}
