package turnstone.spark;

import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.math.BigInteger;
import java.util.Arrays;
import java.util.List;
import turnstone.ledger.ShowingSums;

/** Gathers the parts of one showing and notices when they are not of one showing. */
final class ShowingMerge {
    private static final List<String> IDENTITY = List.of("day", "sorter", "tray", "material");

    private final int channels;
    private Part first;
    private String conflict;
    private long records;
    private long noSignal;
    private long quarantined;
    private final BigInteger[] sums;

    ShowingMerge(int channels) {
        this.channels = channels;
        this.sums = new BigInteger[channels];
        Arrays.fill(sums, BigInteger.ZERO);
    }

    /** What one task knows of a showing; sums empty where it accepted none. */
    private static final class Part {
        final List<String> identity;
        final String instrument;
        final int trayGroup;
        final long records;
        final long noSignal;
        final long quarantined;
        final long[] sums;

        Part(DataInputStream in) throws IOException {
            identity =
                    List.of(Payloads.readText(in), Payloads.readText(in), Payloads.readText(in), Payloads.readText(in));
            instrument = Payloads.readText(in);
            trayGroup = in.readInt();
            records = in.readLong();
            noSignal = in.readLong();
            quarantined = in.readLong();
            sums = new long[in.readInt()];
            for (int c = 0; c < sums.length; c++) {
                sums[c] = in.readLong();
            }
        }
    }

    static byte[] payload(Slot slot, long records, long noSignal, long quarantined, long[] sums) {
        RecordKeys keys = slot.keys;
        return Payloads.bytes(out -> {
            for (String text :
                    new String[] {keys.day(), keys.sorter(), keys.tray(), keys.material(), slot.instrument}) {
                Payloads.writeText(out, text);
            }
            out.writeInt(slot.trayGroup);
            out.writeLong(records);
            out.writeLong(noSignal);
            out.writeLong(quarantined);
            out.writeInt(sums.length);
            for (long sum : sums) {
                out.writeLong(sum);
            }
        });
    }

    void add(byte[] payload) {
        Part part = Payloads.read(payload, Part::new);
        if (first == null) {
            first = part;
        } else {
            compare(part);
        }
        records += part.records;
        noSignal += part.noSignal;
        quarantined += part.quarantined;
        for (int c = 0; c < part.sums.length; c++) {
            sums[c] = sums[c].add(BigInteger.valueOf(part.sums[c]));
        }
    }

    /** Keeps the first difference by field and words, so that the message does not depend on the order of the parts. */
    private void compare(Part part) {
        for (int i = 0; i < IDENTITY.size(); i++) {
            String here = first.identity.get(i);
            String there = part.identity.get(i);
            if (!here.equals(there)) {
                boolean inOrder = here.compareTo(there) < 0;
                String text = IDENTITY.get(i) + " " + (inOrder ? here : there) + " and " + (inOrder ? there : here);
                conflict = conflict == null || text.compareTo(conflict) < 0 ? text : conflict;
                return;
            }
        }
    }

    byte[] result() {
        return Payloads.bytes(out -> {
            Payloads.writeText(out, conflict == null ? "" : conflict);
            for (String text : first.identity) {
                Payloads.writeText(out, text);
            }
            Payloads.writeText(out, first.instrument);
            out.writeInt(first.trayGroup);
            out.writeLong(records);
            out.writeLong(noSignal);
            out.writeLong(quarantined);
            writeSums(out);
        });
    }

    private void writeSums(DataOutputStream out) throws IOException {
        out.writeInt(channels);
        for (BigInteger sum : sums) {
            byte[] bytes = sum.toByteArray();
            out.writeByte(bytes.length);
            out.write(bytes);
        }
    }

    /** A gathered showing, or what its records disagree about. */
    record Result(ShowingSums sums, String day, String conflict) {}

    static Result result(String showing, byte[] payload) {
        return Payloads.read(payload, in -> {
            String conflict = Payloads.readText(in);
            String day = Payloads.readText(in);
            String sorter = Payloads.readText(in);
            String tray = Payloads.readText(in);
            String material = Payloads.readText(in);
            String instrument = Payloads.readText(in);
            int trayGroup = in.readInt();
            long records = in.readLong();
            long noSignal = in.readLong();
            long quarantined = in.readLong();
            BigInteger[] sums = new BigInteger[in.readInt()];
            for (int c = 0; c < sums.length; c++) {
                byte[] bytes = new byte[in.readByte()];
                in.readFully(bytes);
                sums[c] = new BigInteger(bytes);
            }
            return new Result(
                    new ShowingSums(
                            showing,
                            sorter,
                            instrument,
                            tray,
                            trayGroup,
                            material,
                            records,
                            noSignal,
                            quarantined,
                            List.of(sums)),
                    day,
                    conflict);
        });
    }
}
