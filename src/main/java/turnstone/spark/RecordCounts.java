package turnstone.spark;

import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.io.Serializable;
import java.util.ArrayList;
import java.util.Collections;
import java.util.List;
import java.util.Map;
import java.util.SortedMap;
import java.util.TreeMap;
import java.util.TreeSet;
import turnstone.measure.QuarantineReason;

/**
 * What became of records, whole numbers only, with the first quarantined ones; travels with a job's results. Not thread-safe.
 *
 * <p>{@link #merge} is commutative and associative; of quarantined records the first by file and row are kept, up to a bound.
 */
public final class RecordCounts implements Serializable {
    private static final long serialVersionUID = 1L;

    private final int quarantineKept;
    private final TreeMap<String, Long> quarantined = new TreeMap<>();
    private final TreeSet<QuarantinedRecord> kept = new TreeSet<>();
    private long read;
    private long accepted;
    private long noSignal;
    private long passedOver;
    private long leftOut;

    RecordCounts(int quarantineKept) {
        this.quarantineKept = quarantineKept;
    }

    void count(Intake.Outcome outcome, Intake intake) {
        read++;
        switch (outcome) {
            case ACCEPTED -> accepted++;
            case NO_SIGNAL -> noSignal++;
            case PASSED_OVER -> passedOver++;
            case LEFT_OUT -> leftOut++;
            case QUARANTINED -> {
                QuarantineReason reason = intake.reason();
                quarantined.merge(reason.label(), 1L, Math::addExact);
                if (quarantineKept > 0) {
                    keep(intake.quarantined());
                }
            }
        }
    }

    private void keep(QuarantinedRecord record) {
        kept.add(record);
        if (kept.size() > quarantineKept) {
            kept.pollLast();
        }
    }

    void merge(RecordCounts other) {
        read += other.read;
        accepted += other.accepted;
        noSignal += other.noSignal;
        passedOver += other.passedOver;
        leftOut += other.leftOut;
        other.quarantined.forEach((reason, count) -> quarantined.merge(reason, count, Math::addExact));
        other.kept.forEach(this::keep);
    }

    /** Records read by the job. */
    public long read() {
        return read;
    }

    /** Records that became counts. */
    public long accepted() {
        return accepted;
    }

    /** Good measurements of something too dark to tell. */
    public long noSignal() {
        return noSignal;
    }

    /** Records of other days in files that hold many. */
    public long passedOver() {
        return passedOver;
    }

    /** Records of showings left out on purpose. */
    public long leftOut() {
        return leftOut;
    }

    /** Quarantined records by the label of the reason; complete. */
    public SortedMap<String, Long> quarantined() {
        return Collections.unmodifiableSortedMap(quarantined);
    }

    /** All quarantined records. */
    public long quarantinedTotal() {
        return quarantined.values().stream().mapToLong(Long::longValue).sum();
    }

    /** The first quarantined records by file and row, up to the bound of the job. */
    public List<QuarantinedRecord> quarantine() {
        return List.copyOf(kept);
    }

    /** Those records as a CSV table with its header. */
    public String quarantineCsv() {
        StringBuilder text = new StringBuilder(QuarantinedRecord.CSV_HEADER).append('\n');
        kept.forEach(record -> text.append(record.csv()).append('\n'));
        return text.toString();
    }

    /** The share of quarantined records among those of the day; 0 where there are none. */
    public double quarantinedShare() {
        long ofTheDay = read - passedOver - leftOut;
        return ofTheDay == 0 ? 0 : (double) quarantinedTotal() / ofTheDay;
    }

    void write(DataOutputStream out) throws IOException {
        out.writeInt(quarantineKept);
        for (long number : new long[] {read, accepted, noSignal, passedOver, leftOut}) {
            out.writeLong(number);
        }
        out.writeInt(quarantined.size());
        for (Map.Entry<String, Long> reason : quarantined.entrySet()) {
            Payloads.writeText(out, reason.getKey());
            out.writeLong(reason.getValue());
        }
        out.writeInt(kept.size());
        for (QuarantinedRecord record : new ArrayList<>(kept)) {
            record.write(out);
        }
    }

    static RecordCounts read(DataInputStream in) throws IOException {
        RecordCounts counts = new RecordCounts(in.readInt());
        counts.read = in.readLong();
        counts.accepted = in.readLong();
        counts.noSignal = in.readLong();
        counts.passedOver = in.readLong();
        counts.leftOut = in.readLong();
        int reasons = in.readInt();
        for (int i = 0; i < reasons; i++) {
            String label = Payloads.readText(in);
            counts.quarantined.put(label, in.readLong());
        }
        int records = in.readInt();
        for (int i = 0; i < records; i++) {
            counts.kept.add(QuarantinedRecord.read(in));
        }
        return counts;
    }
}
