package turnstone.spark;

import java.util.Map;
import org.junit.jupiter.api.extension.ExtensionContext;
import org.junit.jupiter.api.extension.ParameterContext;
import org.junit.jupiter.api.extension.ParameterResolver;

/** One session for all tests of a run, closed at its end; two task slots, and one more try for a failed task. */
public final class SharedSession implements ParameterResolver {
    private static final ExtensionContext.Namespace OURS = ExtensionContext.Namespace.create(SharedSession.class);

    private record Held(Session session) implements AutoCloseable {
        @Override
        public void close() {
            session.close();
        }
    }

    @Override
    public boolean supportsParameter(ParameterContext parameter, ExtensionContext context) {
        return parameter.getParameter().getType() == Session.class;
    }

    @Override
    public Object resolveParameter(ParameterContext parameter, ExtensionContext context) {
        return of(context);
    }

    /** The session, for extensions that need it themselves. */
    public static Session of(ExtensionContext context) {
        return context.getRoot()
                .getStore(OURS)
                .getOrComputeIfAbsent(
                        Session.class,
                        key -> new Held(Session.open(new Session.Settings("tests", "local[2,4]", Map.of()))),
                        Held.class)
                .session();
    }
}
