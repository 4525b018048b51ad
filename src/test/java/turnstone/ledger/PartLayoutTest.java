package turnstone.ledger;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.math.BigInteger;
import java.util.Arrays;
import java.util.List;
import java.util.Map;
import java.util.TreeMap;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;
import turnstone.moments.BlockKernels;
import turnstone.moments.KernelChoice;
import turnstone.moments.Moments;
import turnstone.moments.RowFolder;
import turnstone.store.ContentWriter;

class PartLayoutTest {
    /** Records (1, -2) and (3, 5) of one showing, and (-2097151, 0) of another: sums by hand. */
    private static DayMoments small() {
        Moments pair = moments(new double[] {1, -2, 3, 5});
        Moments single = moments(new double[] {-2_097_151, 0});
        return DayMoments.of(
                2,
                Map.of(
                        new LedgerKey("avocet@2026-01-01", "PP", 0),
                        pair,
                        new LedgerKey("curlew@2026-01-01", "PÉ", 3),
                        single),
                List.of(
                        showing("s1", "avocet", 0, "PP", 2, 4, 3),
                        showing("s2", "curlew", 3, "PÉ", 1, -2_097_151, 0),
                        showing("s3", "curlew", 3, "PÉ", 0, 0, 0)));
    }

    @Test
    void theMomentsPartIsTheGoldenFile() throws IOException {
        byte[] golden = golden("moments-part-1.bin");
        assertThat(bytes(out -> MomentsPart.write(small(), out))).isEqualTo(golden);
        assertThat(readMoments(golden)).isEqualTo(small().moments());
    }

    @Test
    void theShowingsPartIsTheGoldenFile() throws IOException {
        byte[] golden = golden("showings-part-1.bin");
        assertThat(bytes(out -> ShowingsPart.write(small(), out))).isEqualTo(golden);
        assertThat(ShowingsPart.read(new ByteArrayInputStream(golden)))
                .containsExactlyElementsOf(small().showings().values());
    }

    @Test
    void everyFlippedByteOfAPartIsNoticed() throws IOException {
        for (byte[] part : List.of(golden("moments-part-1.bin"), golden("showings-part-1.bin"))) {
            for (int i = 0; i < part.length; i++) {
                byte[] damaged = part.clone();
                damaged[i] ^= 0x11;
                assertThatThrownBy(() -> readEither(damaged))
                        .as("byte " + i)
                        .isInstanceOfAny(IOException.class, IllegalArgumentException.class, Fault.class);
            }
        }
    }

    @Test
    void everyShorterOrLongerPartIsNoticed() throws IOException {
        for (byte[] part : List.of(golden("moments-part-1.bin"), golden("showings-part-1.bin"))) {
            for (int length = 0; length < part.length; length++) {
                byte[] shorter = Arrays.copyOf(part, length);
                assertThatThrownBy(() -> readEither(shorter))
                        .as("length " + length)
                        .isInstanceOf(Exception.class);
            }
            assertThatThrownBy(() -> readEither(Arrays.copyOf(part, part.length + 1)))
                    .isInstanceOf(IOException.class)
                    .hasMessageContaining("follows the end");
        }
    }

    @Test
    void sumsReachTheEdgesOf128Bits() throws IOException {
        BigInteger most = BigInteger.ONE.shiftLeft(127).subtract(BigInteger.ONE);
        BigInteger least = BigInteger.ONE.shiftLeft(127).negate();
        for (BigInteger sum : List.of(most, least, BigInteger.ZERO, BigInteger.ONE.negate(), BigInteger.valueOf(255))) {
            byte[] written = bytes(out -> new PartOutput(out).sum(sum));
            assertThat(written).hasSize(16);
            assertThat(new PartInput(new ByteArrayInputStream(written)).sum()).isEqualTo(sum);
        }
        assertThatThrownBy(() ->
                        new ShowingSums("s", "a", "a@1", "t", 0, "PP", 1, 0, 0, List.of(most.add(BigInteger.ONE))))
                .isInstanceOf(IllegalArgumentException.class);
    }

    private static void readEither(byte[] part) throws IOException {
        if (part.length > 4 && part[4] == 'M') {
            readMoments(part);
        } else {
            ShowingsPart.read(new ByteArrayInputStream(part));
        }
    }

    private static Map<LedgerKey, Moments> readMoments(byte[] part) throws IOException {
        Map<LedgerKey, Moments> read = new TreeMap<>();
        assertThat(MomentsPart.read(new ByteArrayInputStream(part), (key, moments) -> read.put(key, moments)))
                .isEqualTo(2);
        return read;
    }

    private static ShowingSums showing(
            String id, String sorter, int group, String material, long records, long first, long second) {
        return new ShowingSums(
                id,
                sorter,
                sorter + "@2026-01-01",
                "tray of " + id,
                group,
                material,
                records,
                7,
                11,
                List.of(BigInteger.valueOf(first), BigInteger.valueOf(second)));
    }

    private static Moments moments(double[] rows) {
        RowFolder folder = new RowFolder(2, new boolean[2], BlockKernels.choose(KernelChoice.SCALAR), 4);
        for (int from = 0; from < rows.length; from += 2) {
            folder.add(rows, from);
        }
        return folder.snapshot();
    }

    private static byte[] bytes(ContentWriter writer) throws IOException {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        writer.writeTo(out);
        return out.toByteArray();
    }

    private static byte[] golden(String name) throws IOException {
        try (InputStream in = PartLayoutTest.class.getResourceAsStream("/golden/" + name)) {
            return in.readAllBytes();
        }
    }
}
