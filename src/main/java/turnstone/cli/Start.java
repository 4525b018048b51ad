package turnstone.cli;

import java.io.FileDescriptor;
import java.io.FileOutputStream;
import java.io.PrintStream;
import java.lang.reflect.Constructor;
import java.lang.reflect.InvocationTargetException;
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
    private Start() {}

    /**
     * Puts the caller's standard error back, then calls the {@code main} of the class named first with the other arguments.
     *
     * @throws Throwable whatever that class throws, as it was thrown
     */
    public static void main(String[] arguments) throws Throwable {
        String talk = System.getProperty("turnstone.talk");
        if (talk != null) {
            System.setErr(new PrintStream(
                    new FileOutputStream(descriptor(Integer.parseInt(talk))),
                    true,
                    System.getProperty("stderr.encoding", "UTF-8")));
        }
        Class<?> main = Class.forName(arguments[0], true, Thread.currentThread().getContextClassLoader());
        try {
            main.getMethod("main", String[].class)
                    .invoke(null, (Object) Arrays.copyOfRange(arguments, 1, arguments.length));
        } catch (InvocationTargetException wrapped) {
            throw wrapped.getCause();
        }
    }

    private static FileDescriptor descriptor(int number) throws ReflectiveOperationException {
        Constructor<FileDescriptor> constructor = FileDescriptor.class.getDeclaredConstructor(int.class);
        constructor.setAccessible(true);
        return constructor.newInstance(number);
    }
}
