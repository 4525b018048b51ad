package turnstone.cli;

import java.io.FileDescriptor;
import java.io.FileOutputStream;
import java.io.PrintStream;
import java.lang.reflect.Constructor;
import java.lang.reflect.InvocationTargetException;
import java.nio.charset.StandardCharsets;
import java.util.Arrays;

/**
 * Runs another main class with the caller's standard error put back: {@code Start MAIN_CLASS ARGUMENTS…}.
 *
 * <p>The launcher starts Java with descriptor 2 on the run's log, so that what the JVM itself prints there stays off the terminal, and
 * keeps the caller's standard error on the descriptor that the system property {@code turnstone.talk} names. A duplicate of the
 * descriptor is the only thing that serves files, pipes, sockets and terminals alike: opening {@code /dev/fd/3} again would start a
 * second position in a file. Opening {@code java.io} to reflection is among the options that Spark needs anyway.
 */
public final class Start {
    private static final int FAILED = 4;

    private Start() {}

    /**
     * Puts the caller's standard error back, then calls the {@code main} of the class named first with the other arguments. What that class
     * lets out (Spark's submission does, for a cluster that isn't there) becomes one line and exit code 4; the rest goes to the log.
     */
    public static void main(String[] arguments) throws ReflectiveOperationException {
        PrintStream log = System.err;
        String talk = System.getProperty("turnstone.talk");
        if (talk != null) {
            System.setErr(new PrintStream(
                    new FileOutputStream(descriptor(Integer.parseInt(talk))), true, StandardCharsets.UTF_8));
        }
        Class<?> main = Class.forName(arguments[0], true, Thread.currentThread().getContextClassLoader());
        try {
            main.getMethod("main", String[].class)
                    .invoke(null, (Object) Arrays.copyOfRange(arguments, 1, arguments.length));
        } catch (InvocationTargetException wrapped) {
            Throwable cause = wrapped.getCause();
            Traces.print(cause, log);
            String message =
                    String.valueOf(cause.getMessage()).lines().findFirst().orElse("");
            System.err.println("turnstone: the run could not be started: " + message);
            System.err.println("  the log says more: " + System.getProperty("turnstone.log", "not kept"));
            System.exit(FAILED);
        }
    }

    private static FileDescriptor descriptor(int number) throws ReflectiveOperationException {
        Constructor<FileDescriptor> constructor = FileDescriptor.class.getDeclaredConstructor(int.class);
        constructor.setAccessible(true);
        return constructor.newInstance(number);
    }
}
