package turnstone.fault;

/**
 * A refusal or failure that the user can act on: one line that says what, where, found, expected and what to do.
 *
 * <p>Made through the named factories: {@code throw Fault.input("channel is not a number").at("day.csv row 7").found("\"abc\"")
 * .expected("a decimal").remedy("correct the file or map another column")}. Every part but the first may be left out.
 */
public final class Fault extends RuntimeException {
    private static final long serialVersionUID = 1L;

    /** Why the program stops, with the exit code that says so. */
    public enum Kind {
        /** The command line or the plant file is not valid. */
        USAGE(2),
        /** Records, table, model or day are refused. */
        INPUT(3),
        /** Something is unreadable, is not what was written, or a job failed. */
        STORAGE(4),
        /** Somebody else got there first. */
        BUSY(5);

        private final int exitCode;

        Kind(int exitCode) {
            this.exitCode = exitCode;
        }

        /** The exit code of the process. */
        public int exitCode() {
            return exitCode;
        }
    }

    private final Kind kind;
    private final String what;
    private final String where;
    private final String found;
    private final String expected;
    private final String remedy;

    private Fault(Kind kind, String what, String where, String found, String expected, String remedy, Throwable cause) {
        super(message(what, where, found, expected, remedy), cause);
        this.kind = kind;
        this.what = what;
        this.where = where;
        this.found = found;
        this.expected = expected;
        this.remedy = remedy;
    }

    /** The command line or the plant file is not valid. */
    public static Fault usage(String what) {
        return new Fault(Kind.USAGE, what, null, null, null, null, null);
    }

    /** Records, table, model or day are refused. */
    public static Fault input(String what) {
        return new Fault(Kind.INPUT, what, null, null, null, null, null);
    }

    /** Something is unreadable, is not what was written, or a job failed. */
    public static Fault storage(String what) {
        return new Fault(Kind.STORAGE, what, null, null, null, null, null);
    }

    /** Somebody else got there first. */
    public static Fault busy(String what) {
        return new Fault(Kind.BUSY, what, null, null, null, null, null);
    }

    /** The same fault with the place: file, row, channel, material, key of the plant file. */
    public Fault at(String place) {
        return new Fault(kind, what, place, found, expected, remedy, getCause());
    }

    /** The same fault with what was there. */
    public Fault found(Object value) {
        return new Fault(kind, what, where, String.valueOf(value), expected, remedy, getCause());
    }

    /** The same fault with what would have been right. */
    public Fault expected(Object value) {
        return new Fault(kind, what, where, found, String.valueOf(value), remedy, getCause());
    }

    /** The same fault with what the user can do about it. */
    public Fault remedy(String action) {
        return new Fault(kind, what, where, found, expected, action, getCause());
    }

    /** The same fault with the exception that led to it, for {@code --trace}. */
    public Fault because(Throwable cause) {
        return new Fault(kind, what, where, found, expected, remedy, cause);
    }

    /** Why the program stops. */
    public Kind kind() {
        return kind;
    }

    private static String message(String what, String where, String found, String expected, String remedy) {
        StringBuilder line = new StringBuilder();
        if (where != null) {
            line.append(where).append(": ");
        }
        line.append(what);
        if (found != null) {
            line.append("; found ").append(found);
        }
        if (expected != null) {
            line.append(found == null ? "; expected " : ", expected ").append(expected);
        }
        if (remedy != null) {
            line.append("; ").append(remedy);
        }
        return line.toString().replace('\n', ' ').replace('\r', ' ');
    }
}
