package turnstone.cli;

import java.io.PrintStream;

/** What {@code --trace} adds to a message: the causes and where they were raised. */
final class Traces {
    private static final int FRAMES = 12;

    private Traces() {}

    static void print(Throwable failure, PrintStream err) {
        for (Throwable cause = failure; cause != null; cause = cause.getCause()) {
            err.println("  " + cause.getClass().getName() + ": " + cause.getMessage());
            StackTraceElement[] frames = cause.getStackTrace();
            for (int i = 0; i < Math.min(FRAMES, frames.length); i++) {
                err.println("    " + frames[i]);
            }
        }
    }
}
