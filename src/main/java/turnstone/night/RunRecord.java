package turnstone.night;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.net.InetAddress;
import java.net.UnknownHostException;
import java.time.Clock;
import java.time.Instant;
import turnstone.json.Json;

/** {@code run.json}: names, times, hosts, versions, timings; everything that may differ between runs with equal results. */
final class RunRecord {
    private final Clock clock;
    private final Instant started;
    private final ObjectNode node;
    private Instant lap;

    RunRecord(Clock clock, String command, String plantFile, String day) {
        this.clock = clock;
        this.started = clock.instant();
        this.lap = started;
        this.node = Json.object()
                .put("command", command)
                .put("plantFile", plantFile)
                .put("day", day)
                .put("started", started.toString())
                .put("host", host())
                .put("user", System.getProperty("user.name"))
                .put("java", System.getProperty("java.version"))
                .put("processors", Runtime.getRuntime().availableProcessors())
                .put("memoryLimit_bytes", Runtime.getRuntime().maxMemory());
        node.putObject("timings_ms");
    }

    /** A step has ended; its time is since the one before it. */
    void lap(String step) {
        Instant now = clock.instant();
        ((ObjectNode) node.get("timings_ms")).put(step, now.toEpochMilli() - lap.toEpochMilli());
        lap = now;
    }

    void put(String key, String value) {
        node.put(key, value);
    }

    void put(String key, long value) {
        node.put(key, value);
    }

    ObjectNode ended() {
        Instant now = clock.instant();
        return node.deepCopy()
                .put("ended", now.toString())
                .put("elapsed_ms", now.toEpochMilli() - started.toEpochMilli());
    }

    private static String host() {
        try {
            return InetAddress.getLocalHost().getHostName();
        } catch (UnknownHostException e) {
            return "unknown";
        }
    }
}
