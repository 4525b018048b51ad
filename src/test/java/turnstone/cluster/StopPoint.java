package turnstone.cluster;

import com.sun.jdi.Bootstrap;
import com.sun.jdi.ReferenceType;
import com.sun.jdi.VirtualMachine;
import com.sun.jdi.connect.Connector;
import com.sun.jdi.connect.IllegalConnectorArgumentsException;
import com.sun.jdi.connect.ListeningConnector;
import com.sun.jdi.event.BreakpointEvent;
import com.sun.jdi.event.ClassPrepareEvent;
import com.sun.jdi.event.Event;
import com.sun.jdi.event.EventSet;
import com.sun.jdi.event.VMDisconnectEvent;
import com.sun.jdi.request.BreakpointRequest;
import com.sun.jdi.request.ClassPrepareRequest;
import com.sun.jdi.request.EventRequest;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.time.Duration;
import java.util.Map;

/**
 * Holds a thread of another Java process where it enters a method, so that a test can end the process exactly there.
 *
 * <p>The process connects back to this listener (its option is {@link #javaOption}) and waits until it was accepted; the port is chosen
 * free. Only the thread that enters the method is held, the others go on.
 */
final class StopPoint implements AutoCloseable {
    private static final Duration LIMIT = Duration.ofMinutes(2);
    /** What a shell says of a process that was killed. */
    private static final int KILLED = 137;

    private final ListeningConnector connector;
    private final Map<String, Connector.Argument> arguments;
    private final String address;

    private StopPoint(ListeningConnector connector) throws IOException, IllegalConnectorArgumentsException {
        this.connector = connector;
        this.arguments = connector.defaultArguments();
        arguments.get("localAddress").setValue("127.0.0.1");
        arguments.get("timeout").setValue(Long.toString(LIMIT.toMillis()));
        this.address = connector.startListening(arguments);
    }

    static StopPoint listen() {
        ListeningConnector sockets = Bootstrap.virtualMachineManager().listeningConnectors().stream()
                .filter(connector -> connector.name().equals("com.sun.jdi.SocketListen"))
                .findFirst()
                .orElseThrow();
        try {
            return new StopPoint(sockets);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        } catch (IllegalConnectorArgumentsException defect) {
            throw new IllegalStateException(defect);
        }
    }

    /** What makes a Java process connect to this listener before its first step. */
    String javaOption() {
        return "-agentlib:jdwp=transport=dt_socket,server=n,suspend=y,address=127.0.0.1"
                + address.substring(address.lastIndexOf(':'));
    }

    /** Accepts the next process that connects and lets it run. */
    Held accept() {
        try {
            VirtualMachine machine = connector.accept(arguments);
            return new Held(machine);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        } catch (IllegalConnectorArgumentsException defect) {
            throw new IllegalStateException(defect);
        }
    }

    @Override
    public void close() {
        try {
            connector.stopListening(arguments);
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        } catch (IllegalConnectorArgumentsException defect) {
            throw new IllegalStateException(defect);
        }
    }

    /** A process that waits to be told where to stop. */
    static final class Held {
        private final VirtualMachine machine;

        private Held(VirtualMachine machine) {
            this.machine = machine;
        }

        /** Lets it go on, and forgets it. */
        void release() {
            machine.dispose();
        }

        /** Ends it where it stands: no hook of it runs. */
        void end() {
            machine.exit(KILLED);
        }

        /** Lets it run until a thread enters {@code method} of the class {@code type}; that thread is held when this returns. */
        void runTo(String type, String method) {
            ClassPrepareRequest loaded = machine.eventRequestManager().createClassPrepareRequest();
            loaded.addClassFilter(type);
            loaded.setSuspendPolicy(EventRequest.SUSPEND_ALL);
            loaded.enable();
            machine.resume();
            long deadline_ns = System.nanoTime() + LIMIT.toNanos();
            while (System.nanoTime() < deadline_ns) {
                EventSet events = next();
                if (events == null) {
                    continue;
                }
                for (Event event : events) {
                    if (event instanceof BreakpointEvent) {
                        return;
                    }
                    if (event instanceof VMDisconnectEvent) {
                        throw new AssertionError("the process ended before " + type + "." + method);
                    }
                    if (event instanceof ClassPrepareEvent prepared) {
                        stopAt(prepared.referenceType(), method);
                    }
                }
                events.resume();
            }
            throw new AssertionError("never reached: " + type + "." + method);
        }

        private EventSet next() {
            try {
                return machine.eventQueue().remove(1000);
            } catch (InterruptedException interrupted) {
                Thread.currentThread().interrupt();
                throw new IllegalStateException(interrupted);
            }
        }

        private void stopAt(ReferenceType type, String method) {
            BreakpointRequest stop = machine.eventRequestManager()
                    .createBreakpointRequest(type.methodsByName(method).get(0).location());
            stop.setSuspendPolicy(EventRequest.SUSPEND_EVENT_THREAD);
            stop.enable();
        }
    }
}
