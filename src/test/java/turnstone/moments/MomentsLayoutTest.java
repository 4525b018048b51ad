package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatThrownBy;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.ObjectInputStream;
import java.io.ObjectOutputStream;
import java.math.BigInteger;
import java.nio.ByteBuffer;
import java.util.Arrays;
import java.util.function.Consumer;
import java.util.zip.CRC32C;
import org.assertj.core.api.AbstractThrowableAssert;
import org.junit.jupiter.api.Test;
import turnstone.fault.Fault;

class MomentsLayoutTest {
    /** What the golden file holds; it was written by a few lines in another language, from the table of {@link MomentsLayout}. */
    private static final double[][] GOLDEN_RECORDS = {
        {5, -300, Bounds.FINE_LIMIT}, {-7, 20_000, -(1L << 40)}, {0, -1, 3}, {129, 77, -12_345_678_901L}
    };

    private static final Moments GOLDEN = new CountSample(3, GOLDEN_RECORDS)
            .fold(BlockKernels.choose(KernelChoice.SCALAR), CountSample.marks(3, true), 4);

    @Test
    void versionOneIsWrittenAndReadForEver() throws IOException {
        byte[] golden = golden();
        assertThat(GOLDEN.toBytes()).isEqualTo(golden);
        assertThat(Moments.fromBytes(golden)).isEqualTo(GOLDEN);
        assertThat(GOLDEN.fingerprint()).isEqualTo("cb71301e3215af61330d49e07f3aef6f32ccc218ae58d082a3ef766f7b1eeac2");
    }

    @Test
    void sectionsAreNoWiderThanTheirNumbers() {
        assertThat(Moments.empty(5).toBytes()).hasSize(24 + 5 + 15);
        assertThat(one(127, 1).toBytes()).as("127 in one byte, 16129 in two").hasSize(24 + 1 + 2);
        assertThat(one(128, 1).toBytes()).as("128 in two bytes, 16384 in two").hasSize(24 + 2 + 2);
        assertThat(one(-128, 1).toBytes()).as("-128 in one byte").hasSize(24 + 1 + 2);
        assertThat(one(182, 1).toBytes()).as("33124 in three bytes").hasSize(24 + 2 + 3);
        assertThat(one(0, 9).toBytes()).hasSize(24 + 1 + 1);
    }

    @Test
    void everyChangedByteIsNoticed() throws IOException {
        byte[] golden = golden();
        for (int at = 0; at < golden.length; at++) {
            for (int bit = 0; bit < 8; bit++) {
                byte[] changed = golden.clone();
                changed[at] ^= (byte) (1 << bit);
                assertRefused(changed);
            }
        }
    }

    @Test
    void everyCutAndEveryAdditionIsNoticed() throws IOException {
        byte[] golden = golden();
        for (int length = 0; length < golden.length; length++) {
            assertRefused(Arrays.copyOf(golden, length));
        }
        assertRefused(Arrays.copyOf(golden, golden.length + 1)).hasMessageContaining("wrong length");
    }

    @Test
    void refusalsSayWhatIsWrong() throws IOException {
        assertRefused(new byte[3]).hasMessageContaining("too short").hasMessageContaining("3 bytes");
        assertRefused(changed(bytes -> bytes.put(0, (byte) 'X')))
                .hasMessageContaining("not moments")
                .hasMessageContaining("58734d6f");
        assertRefused(changed(bytes -> bytes.putShort(4, (short) 2)))
                .hasMessageContaining("another version")
                .hasMessageContaining("found 2, expected 1");
        assertRefused(changed(bytes -> bytes.put(6, (byte) 17))).hasMessageContaining("bytes of a sum");
        assertRefused(changed(bytes -> bytes.put(7, (byte) 0))).hasMessageContaining("bytes of a product");
        assertRefused(changed(bytes -> bytes.putInt(8, -1))).hasMessageContaining("channels");
        assertRefused(changed(bytes -> bytes.putLong(12, -1))).hasMessageContaining("records");
        assertRefused(changed(bytes -> bytes.putLong(12, (1L << 41) + 1))).hasMessageContaining("records");
        byte[] twoAsOne = ByteBuffer.wrap(one(3, 2).toBytes()).putLong(12, 1).array();
        assertRefused(sealed(twoAsOne)).hasMessageContaining("scatter below zero in channel 0");
        assertRefused(changed(bytes -> bytes.putLong(12, 0))).hasMessageContaining("scatter below zero");
        byte[] golden = golden();
        golden[30]++;
        assertRefused(golden).hasMessageContaining("checksum");
    }

    /** Equal moments must have equal bytes: a wider form of the same numbers, checksum and all, is none of ours. */
    @Test
    void aFormThatIsNotTheShortestIsRefused() {
        byte[] wide = ByteBuffer.allocate(24 + 2 + 1)
                .putInt(MomentsLayout.MAGIC)
                .putShort((short) 1)
                .put((byte) 2)
                .put((byte) 1)
                .putInt(1)
                .putLong(1)
                .putShort((short) 3)
                .put((byte) 9)
                .array();
        assertRefused(sealed(wide)).hasMessageContaining("bytes of a sum").hasMessageContaining("found 2, expected 1");
        assertThat(one(3, 1).toBytes()).hasSize(wide.length - 1);
    }

    @Test
    void serialisationGoesThroughTheBytes() throws Exception {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try (ObjectOutputStream objects = new ObjectOutputStream(out)) {
            objects.writeObject(GOLDEN);
        }
        try (ObjectInputStream objects = new ObjectInputStream(new ByteArrayInputStream(out.toByteArray()))) {
            assertThat(objects.readObject()).isEqualTo(GOLDEN);
        }
    }

    @Test
    void wordsAreThoseOfTheIntegers() {
        for (int i = 0; i < 3; i++) {
            assertThat(words(GOLDEN.sumHigh(i), GOLDEN.sumLow(i))).isEqualTo(GOLDEN.sum(i));
            for (int j = 0; j <= i; j++) {
                assertThat(words(GOLDEN.productHigh(i, j), GOLDEN.productLow(i, j)))
                        .isEqualTo(GOLDEN.product(j, i));
            }
        }
        assertThatThrownBy(() -> GOLDEN.sum(3)).isInstanceOf(IndexOutOfBoundsException.class);
        assertThatThrownBy(() -> GOLDEN.product(0, 3)).isInstanceOf(IndexOutOfBoundsException.class);
        assertThatThrownBy(() -> GOLDEN.product(-1, 0)).isInstanceOf(IndexOutOfBoundsException.class);
    }

    private static BigInteger words(long high, long low) {
        return BigInteger.valueOf(high).shiftLeft(64).add(new BigInteger(Long.toUnsignedString(low)));
    }

    private static Moments one(long count, int records) {
        double[][] counts = new double[records][1];
        for (double[] record : counts) {
            record[0] = count;
        }
        return new CountSample(1, counts)
                .fold(BlockKernels.choose(KernelChoice.SCALAR), CountSample.marks(1, false), 4);
    }

    private static byte[] golden() throws IOException {
        try (InputStream in = MomentsLayoutTest.class.getResourceAsStream("moments-1.bin")) {
            return in.readAllBytes();
        }
    }

    private static byte[] changed(Consumer<ByteBuffer> change) throws IOException {
        byte[] bytes = golden();
        change.accept(ByteBuffer.wrap(bytes));
        return sealed(bytes);
    }

    private static byte[] sealed(byte[] bytes) {
        CRC32C crc = new CRC32C();
        crc.update(bytes, 0, bytes.length - 4);
        ByteBuffer.wrap(bytes).putInt(bytes.length - 4, (int) crc.getValue());
        return bytes;
    }

    private static AbstractThrowableAssert<?, ? extends Throwable> assertRefused(byte[] bytes) {
        return assertThatThrownBy(() -> Moments.fromBytes(bytes))
                .isInstanceOfSatisfying(
                        Fault.class, fault -> assertThat(fault.kind()).isEqualTo(Fault.Kind.STORAGE));
    }
}
