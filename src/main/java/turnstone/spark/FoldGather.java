package turnstone.spark;

import java.util.Iterator;
import java.util.NoSuchElementException;
import scala.Tuple2;

/** Gathers partial results of one partition of the shuffle, which come sorted by key: one key is held at a time. */
final class FoldGather implements Iterator<Tuple2<String, byte[]>> {
    private final Iterator<Tuple2<String, byte[]>> sorted;
    private final FoldShape shape;
    private Tuple2<String, byte[]> ahead;

    FoldGather(Iterator<Tuple2<String, byte[]>> sorted, FoldShape shape) {
        this.sorted = sorted;
        this.shape = shape;
        advance();
    }

    private void advance() {
        ahead = sorted.hasNext() ? sorted.next() : null;
    }

    @Override
    public boolean hasNext() {
        return ahead != null;
    }

    @Override
    public Tuple2<String, byte[]> next() {
        if (ahead == null) {
            throw new NoSuchElementException();
        }
        String key = ahead._1();
        byte[] result;
        if (FoldKeys.isMoments(key)) {
            result = moments(key);
        } else if (FoldKeys.isShowing(key)) {
            result = showing(key);
        } else {
            result = summary(key);
        }
        return new Tuple2<>(key, result);
    }

    private boolean more(String key) {
        return ahead != null && ahead._1().equals(key);
    }

    private byte[] moments(String key) {
        MomentsMerge merge = new MomentsMerge(shape);
        while (more(key)) {
            merge.add(ahead._2());
            advance();
        }
        return merge.result();
    }

    private byte[] showing(String key) {
        ShowingMerge merge = new ShowingMerge(shape.channels());
        while (more(key)) {
            merge.add(ahead._2());
            advance();
        }
        return merge.result();
    }

    private byte[] summary(String key) {
        FoldSummary total = Payloads.read(ahead._2(), FoldSummary::read);
        advance();
        while (more(key)) {
            total = total.plus(Payloads.read(ahead._2(), FoldSummary::read));
            advance();
        }
        return Payloads.bytes(total::write);
    }
}
