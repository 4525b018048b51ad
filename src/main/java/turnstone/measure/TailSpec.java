package turnstone.measure;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ArrayNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.io.Serializable;
import java.util.ArrayList;
import java.util.List;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The steps of the linear tail, in the order in which they apply. Immutable.
 *
 * @param steps smoothing or derivatives, bins, masks; may be empty
 */
public record TailSpec(List<Step> steps) implements Serializable {
    /** One linear step. */
    public sealed interface Step extends Serializable permits SavitzkyGolay, Bins, Mask {}

    /**
     * Savitzky–Golay: value or derivative, at the centre of each window, of the polynomial that fits the window by least squares. Channels count as 1 apart. Ends are
     * dropped: window − 1 channels fewer come out.
     *
     * @param window number of channels, odd
     * @param order of the polynomial, below the window
     * @param derivative 0 to smooth; at most the order
     */
    public record SavitzkyGolay(int window, int order, int derivative) implements Step {
        /** Checks the numbers against each other. */
        public SavitzkyGolay {
            if (window < 1 || window % 2 == 0) {
                throw refusal("a smoothing window must be odd, so that it has a centre")
                        .found(window);
            }
            if (order < 0 || order >= window) {
                throw refusal("the polynomial's order must be below the window")
                        .found("order " + order + ", window " + window);
            }
            if (derivative < 0 || derivative > order) {
                throw refusal("a derivative above the polynomial's order is 0 everywhere")
                        .found("derivative " + derivative + ", order " + order);
            }
        }
    }

    /**
     * Means of neighbouring channels; where the width does not divide the channels, the last bin is the mean of those that are left.
     *
     * @param width channels in a bin
     */
    public record Bins(int width) implements Step {
        /** Checks the width. */
        public Bins {
            if (width < 1) {
                throw refusal("a bin needs at least one channel").found(width);
            }
        }
    }

    /**
     * Drops a run of the channels that reach this step.
     *
     * @param first 0-based
     * @param last 0-based, included
     */
    public record Mask(int first, int last) implements Step {
        /** Checks the order. */
        public Mask {
            if (first < 0 || last < first) {
                throw refusal("a masked range that is not one").found("channels " + (first + 1) + " to " + (last + 1));
            }
        }
    }

    /** Copies the list. */
    public TailSpec {
        steps = List.copyOf(steps);
    }

    /** No step. */
    public static TailSpec none() {
        return new TailSpec(List.of());
    }

    /** These steps in this order. */
    public static TailSpec of(Step... steps) {
        return new TailSpec(List.of(steps));
    }

    /**
     * Channels that come out of d.
     *
     * @throws Fault of kind usage where a step doesn't fit the channels that reach it
     */
    public int outputs(int channels) {
        int left = channels;
        for (Step step : steps) {
            left = outputs(step, left);
        }
        return left;
    }

    static int outputs(Step step, int channels) {
        if (step instanceof SavitzkyGolay smooth) {
            if (smooth.window > channels) {
                throw refusal("a smoothing window longer than the channels")
                        .found("window " + smooth.window + ", channels " + channels);
            }
            return channels - smooth.window + 1;
        }
        if (step instanceof Bins bins) {
            if (bins.width > channels) {
                throw refusal("a bin wider than the channels").found("width " + bins.width + ", channels " + channels);
            }
            return (channels + bins.width - 1) / bins.width;
        }
        Mask mask = (Mask) step;
        if (mask.last >= channels) {
            throw refusal("a mask beyond the channels")
                    .found("channels " + (mask.first + 1) + " to " + (mask.last + 1))
                    .expected("1 to " + channels);
        }
        int left = channels - (mask.last - mask.first + 1);
        if (left == 0) {
            throw refusal("the mask leaves no channel").found("all " + channels + " masked");
        }
        return left;
    }

    /** {@code {"steps": [{"step", …}]}}; channel numbers in it count from 1. */
    public JsonNode json() {
        ObjectNode node = Json.object();
        ArrayNode list = node.putArray("steps");
        for (Step step : steps) {
            ObjectNode one = list.addObject();
            if (step instanceof SavitzkyGolay smooth) {
                one.put("step", "savitzky-golay")
                        .put("window", smooth.window)
                        .put("order", smooth.order)
                        .put("derivative", smooth.derivative);
            } else if (step instanceof Bins bins) {
                one.put("step", "bins").put("width", bins.width);
            } else if (step instanceof Mask mask) {
                one.put("step", "mask").put("fromChannel", mask.first + 1).put("toChannel", mask.last + 1);
            }
        }
        return node;
    }

    /**
     * Reads what {@link #json} wrote.
     *
     * @throws Fault of kind storage for an unknown or malformed key, of kind usage for senseless numbers
     */
    public static TailSpec fromJson(JsonNode node) {
        HeadSpecBuilder.Keys top = new HeadSpecBuilder.Keys(node);
        List<Step> steps = new ArrayList<>();
        for (JsonNode one : top.take("steps")) {
            steps.add(step(new HeadSpecBuilder.Keys(one)));
        }
        top.finish();
        return new TailSpec(steps);
    }

    private static Step step(HeadSpecBuilder.Keys keys) {
        String name = keys.text("step");
        Step step = switch (name) {
            case "savitzky-golay" ->
                new SavitzkyGolay(whole(keys, "window"), whole(keys, "order"), whole(keys, "derivative"));
            case "bins" -> new Bins(whole(keys, "width"));
            case "mask" -> new Mask(whole(keys, "fromChannel") - 1, whole(keys, "toChannel") - 1);
            default ->
                throw Fault.storage("an unknown step of a pretreatment tail").found(name);
        };
        keys.finish();
        return step;
    }

    private static int whole(HeadSpecBuilder.Keys keys, String key) {
        return Math.toIntExact(keys.whole(key));
    }

    /** SHA-256 of the canonical {@link #json}. */
    public String fingerprint() {
        return Json.fingerprint(json());
    }

    private static Fault refusal(String what) {
        return Fault.usage(what).at("pretreatment tail");
    }
}
