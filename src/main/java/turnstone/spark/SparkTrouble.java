package turnstone.spark;

import java.io.FileNotFoundException;
import java.util.Map;
import java.util.function.Supplier;
import org.apache.spark.SparkThrowable;
import turnstone.fault.Fault;

/** Digs the reason out of what the engine throws and says it in one line. */
final class SparkTrouble {
    private static final int LONGEST_REASON = 300;

    private SparkTrouble() {}

    /** Runs a step of a job; what it throws comes out as a {@link Fault}. The engine throws checked exceptions without declaring them. */
    static <T> T guard(String doing, Supplier<T> step) {
        try {
            return step.get();
        } catch (Exception e) {
            throw fault(doing, e);
        }
    }

    /** The fault inside a failure of the engine, or one made from its innermost reason. */
    static RuntimeException fault(String doing, Throwable failure) {
        String path = null;
        Throwable innermost = failure;
        for (Throwable cause = failure; cause != null; cause = cause.getCause()) {
            if (cause instanceof Fault fault) {
                return fault;
            }
            if (path == null && cause instanceof SparkThrowable known) {
                path = pathOf(known);
            }
            innermost = cause;
        }
        if (innermost instanceof OutOfMemoryError) {
            return place(
                    Fault.storage("out of memory while " + doing)
                            .remedy("give the engine more memory, or lower the bound on a task's memory"),
                    path,
                    failure);
        }
        if (failure == innermost && failure instanceof RuntimeException defect && isDefect(defect)) {
            return defect;
        }
        String what = innermost instanceof FileNotFoundException ? "a file is gone" : "failed";
        return place(Fault.storage(what + " while " + doing).found(reason(innermost)), path, failure);
    }

    private static boolean isDefect(Throwable failure) {
        return failure instanceof IllegalArgumentException
                || failure instanceof IllegalStateException
                || failure instanceof NullPointerException
                || failure instanceof IndexOutOfBoundsException;
    }

    private static Fault place(Fault fault, String path, Throwable cause) {
        return (path == null ? fault : fault.at(path)).because(cause);
    }

    private static String pathOf(SparkThrowable known) {
        Map<String, String> parameters = known.getMessageParameters();
        return parameters == null ? null : parameters.get("path");
    }

    private static String reason(Throwable cause) {
        String message = String.valueOf(cause.getMessage()).lines().findFirst().orElse("");
        String text = cause.getClass().getSimpleName() + ": " + message;
        return text.length() <= LONGEST_REASON ? text : text.substring(0, LONGEST_REASON) + "…";
    }
}
