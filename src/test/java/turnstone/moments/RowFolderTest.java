package turnstone.moments;

import static org.assertj.core.api.Assertions.assertThat;
import static org.assertj.core.api.Assertions.assertThatIllegalArgumentException;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

class RowFolderTest {
    private static final BlockKernel KERNEL = BlockKernels.choose(KernelChoice.SCALAR);

    @ParameterizedTest
    @ValueSource(
            doubles = {
                Double.NaN,
                Double.POSITIVE_INFINITY,
                0.5,
                Bounds.COARSE_LIMIT + 1.0,
                -Bounds.COARSE_LIMIT - 1.0,
                1e300
            })
    void refusesWhatIsNoCountAndKeepsNothingOfIt(double notACount) {
        RowFolder folder = new RowFolder(3, CountSample.marks(3, false), KERNEL, 2);
        folder.add(new double[] {1, 2, 3}, 0);
        assertThatIllegalArgumentException()
                .isThrownBy(() -> folder.add(new double[] {4, 5, notACount}, 0))
                .withMessageContaining("channel 2");
        folder.add(new double[] {6, 7, 8}, 0);
        CountSample kept = new CountSample(3, new double[][] {{1, 2, 3}, {6, 7, 8}});
        kept.assertMoments(folder.snapshot());
    }

    @Test
    void takesTheLargestCountsAndRefusesTheNext() {
        RowFolder folder = new RowFolder(2, new boolean[] {false, true}, KERNEL, 8);
        folder.add(new double[] {Bounds.COARSE_LIMIT, -Bounds.FINE_LIMIT}, 0);
        assertThatIllegalArgumentException()
                .isThrownBy(() -> folder.add(new double[] {0, Bounds.FINE_LIMIT + 1}, 0))
                .withMessageContaining("channel 1");
        assertThat(folder.records()).isEqualTo(1);
    }

    @Test
    void readsARecordWhereItBegins() {
        RowFolder folder = new RowFolder(2, CountSample.marks(2, false), KERNEL, 8);
        folder.add(new double[] {9, 9, 9, 3, -4}, 3);
        new CountSample(2, new double[][] {{3, -4}}).assertMoments(folder.snapshot());
    }

    @Test
    void goesOnAfterASnapshot() {
        CountSample sample = CountSample.drawn(11, 5000, 3, Bounds.COARSE_LIMIT);
        RowFolder folder = new RowFolder(3, new boolean[] {true, false, false}, KERNEL, 700);
        Moments early = sample.fold(folder, 0, 2500);
        assertThat(folder.snapshot()).isEqualTo(early);
        sample.assertMoments(sample.fold(folder, 2500, 5000));
        assertThat(early.records()).isEqualTo(2500);
    }

    @Test
    void startsAnewAfterAReset() {
        CountSample first = CountSample.drawn(12, 3000, 4, Bounds.COARSE_LIMIT);
        CountSample second = CountSample.drawn(13, 90, 4, Bounds.COARSE_LIMIT);
        RowFolder folder = new RowFolder(4, new boolean[] {false, true, false, false}, KERNEL, 512);
        first.fold(folder, 0, 3000);
        folder.add(new double[] {1, 1, 1, 1}, 0);
        folder.reset();
        assertThat(folder.records()).isZero();
        assertThat(folder.snapshot()).isEqualTo(Moments.empty(4));
        second.assertMoments(second.fold(folder, 0, 90));
    }

    @Test
    void staysWithinTheBytesItStates() {
        CountSample sample = CountSample.drawn(14, 3000, 20, Bounds.COARSE_LIMIT);
        boolean[] fine = CountSample.marks(20, false);
        fine[3] = true;
        RowFolder folder = new RowFolder(20, fine, KERNEL, 1000);
        long most = RowFolder.bytes(20, 1, 1000);
        folder.add(sample.records()[0], 0);
        assertThat(folder.bytes()).as("a key of one record").isLessThan(most / 50);
        sample.fold(folder, 1, 3000);
        assertThat(folder.bytes()).isBetween(most / 2, most);
    }

    @Test
    void refusesShapesThatCanNotBe() {
        assertThatIllegalArgumentException().isThrownBy(() -> new RowFolder(3, CountSample.marks(2, false), KERNEL, 8));
        assertThatIllegalArgumentException().isThrownBy(() -> new RowFolder(0, new boolean[0], KERNEL, 8));
        assertThatIllegalArgumentException().isThrownBy(() -> new RowFolder(3, CountSample.marks(3, false), KERNEL, 0));
        assertThatIllegalArgumentException()
                .isThrownBy(() -> new RowFolder(3, CountSample.marks(3, false), KERNEL, 2049));
        assertThatIllegalArgumentException().isThrownBy(() -> RowFolder.bytes(3, 4, 8));
    }
}
