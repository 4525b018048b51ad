package turnstone.cli;

import java.util.Map;
import turnstone.spark.ReadProgress;
import turnstone.spark.Session;

/** Starts the engine for a command; the launcher or {@code spark-submit} has said where. */
final class Engine {
    private Engine() {}

    static Session open(String command, Console console) {
        console.talk().phase("start the engine");
        String master = System.getProperty("spark.master", "local[*]");
        Session session = Session.open(
                new Session.Settings("turnstone " + command, master, Map.of("spark.executor.heartbeatInterval", "2s")));
        ReadProgress.tell(session, console.talk()::records);
        console.talk().done("engine " + session.spark().version() + " on " + master);
        return session;
    }
}
