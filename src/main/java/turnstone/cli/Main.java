package turnstone.cli;

import java.io.PrintStream;
import java.io.PrintWriter;
import java.nio.charset.StandardCharsets;
import java.util.List;
import picocli.CommandLine;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.UnmatchedArgumentException;
import turnstone.fault.Fault;

/**
 * Entry point. Exit codes: 0 done (released or held), 2 usage or plant file, 3 input refused, 4 storage or cluster, 5 busy, 70 a defect,
 * 130 interrupted.
 */
public final class Main {
    static final int USAGE = 2;
    static final int DEFECT = 70;
    static final int INTERRUPTED = 130;

    private Main() {}

    public static void main(String[] arguments) {
        Talk talk = talk(System.err);
        Interruption watched = Interruption.watch(talk, System.err);
        int code = run(arguments, System.out, System.err, talk);
        watched.end();
        System.out.flush();
        System.err.flush();
        System.exit(code);
    }

    /** Runs one command and returns its exit code; never lets an exception out. */
    public static int run(String[] arguments, PrintStream out, PrintStream err) {
        return run(arguments, out, err, talk(err));
    }

    private static Talk talk(PrintStream err) {
        boolean terminal = "yes".equals(System.getProperty("turnstone.terminal"));
        return new Talk(err, terminal ? Talk.Screen.TERMINAL : Talk.Screen.PLAIN);
    }

    private static int run(String[] arguments, PrintStream out, PrintStream err, Talk talk) {
        boolean trace = List.of(arguments).contains("--trace");
        CommandLine line = Commands.line(new Console(out, talk));
        line.setOut(new PrintWriter(out, true, StandardCharsets.UTF_8));
        line.setErr(new PrintWriter(err, true, StandardCharsets.UTF_8));
        line.setUsageHelpAutoWidth(false);
        line.setUsageHelpWidth(100);
        line.setCaseInsensitiveEnumValuesAllowed(true);
        line.setParameterExceptionHandler((e, given) -> usage(e, err));
        line.setExecutionExceptionHandler((e, command, parsed) -> failure(e, talk, err, trace));
        try {
            return line.execute(arguments);
        } catch (OutOfMemoryError e) {
            talk.wipe();
            err.println(
                    "turnstone: out of memory (" + e.getMessage() + "); give it more with TURNSTONE_HEAP, such as 6g");
            return Fault.Kind.STORAGE.exitCode();
        } catch (LinkageError e) {
            talk.wipe();
            err.println("turnstone: the program does not fit together: " + firstLine(String.valueOf(e.getMessage()))
                    + "; remove the folder target and start again");
            return DEFECT;
        }
    }

    private static int usage(ParameterException e, PrintStream err) {
        String command = e.getCommandLine().getCommandSpec().qualifiedName(" ");
        err.println("turnstone: " + firstLine(e.getMessage()));
        if (e instanceof UnmatchedArgumentException unmatched) {
            List<String> near = unmatched.getSuggestions();
            if (!near.isEmpty()) {
                err.println("  did you mean " + String.join(" or ", near) + "?");
            }
        }
        err.println("  " + command + " --help tells what it takes");
        return USAGE;
    }

    private static int failure(Exception e, Talk talk, PrintStream err, boolean trace) {
        if (Interruption.isUnderWay()) {
            // What the engine throws while it is being ended; the line about it is said elsewhere.
            return INTERRUPTED;
        }
        talk.wipe();
        int code;
        if (e instanceof Fault fault) {
            err.println("turnstone: " + fault.getMessage());
            code = fault.kind().exitCode();
        } else if (isInterrupt(e)) {
            err.println(Interruption.LINE);
            code = INTERRUPTED;
        } else {
            err.println("turnstone: a defect in this program: " + e.getClass().getSimpleName() + ": "
                    + firstLine(String.valueOf(e.getMessage())));
            err.println("  run it again with --trace and report the lines that follow");
            code = DEFECT;
        }
        if (trace) {
            Traces.print(e, err);
        }
        return code;
    }

    private static boolean isInterrupt(Throwable e) {
        for (Throwable cause = e; cause != null; cause = cause.getCause()) {
            if (cause instanceof InterruptedException) {
                return true;
            }
        }
        return false;
    }

    private static String firstLine(String text) {
        return text.lines().findFirst().orElse("");
    }
}
