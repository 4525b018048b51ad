package turnstone.cli;

import java.io.PrintStream;

/**
 * Says one line when the process is told to end (Ctrl-C, TERM) while a command runs. What the engine makes of its own end is not the
 * user's trouble: {@link #isUnderWay} lets it be passed over.
 */
final class Interruption {
    static final String LINE = "turnstone: interrupted; nothing is half published, run it again";

    private final Thread hook;

    private Interruption(Thread hook) {
        this.hook = hook;
    }

    /** Watches until {@link #end}. */
    static Interruption watch(Talk talk, PrintStream err) {
        Thread hook = new Thread(
                () -> {
                    talk.wipe();
                    err.println(LINE);
                    err.flush();
                },
                "interruption");
        Runtime.getRuntime().addShutdownHook(hook);
        return new Interruption(hook);
    }

    /** Whether this process is ending already. */
    static boolean isUnderWay() {
        Thread probe = new Thread(() -> {}, "probe");
        try {
            Runtime.getRuntime().addShutdownHook(probe);
            Runtime.getRuntime().removeShutdownHook(probe);
            return false;
        } catch (IllegalStateException ending) {
            return true;
        }
    }

    /** The command has ended by itself: nothing is said any more. */
    void end() {
        try {
            Runtime.getRuntime().removeShutdownHook(hook);
        } catch (IllegalStateException ending) {
            // The line is being said already.
            return;
        }
    }
}
