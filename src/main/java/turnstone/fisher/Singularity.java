package turnstone.fisher;

import java.math.BigDecimal;
import java.math.MathContext;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.stream.Collectors;
import java.util.stream.IntStream;
import turnstone.fault.Fault;

/** Says which channels make the within scatter singular, in words that a person can act on. */
final class Singularity {
    /** Terms of a combination smaller than this share of the largest, in standard deviations, are rounding. */
    private static final double NEGLIGIBLE_TERM = 1e-9;

    /** More than a person reads in one line. */
    private static final int MOST_NAMED = 6;

    private static final MathContext SHOWN_DIGITS = new MathContext(6);

    private static final String REMEDY = "give a ridge, such as 0.001, or leave the channels out";

    private final FitRequest request;
    private final Scatter scatter;

    Singularity(FitRequest request, Scatter scatter) {
        this.request = request;
        this.scatter = scatter;
    }

    /** Channels without any scatter within the materials: exactly zero, since the sums are exact. */
    void refuseConstantChannels() {
        ExtendedMatrix within = scatter.within();
        List<Integer> constant = IntStream.range(0, within.columns)
                .filter(i -> within.high[i][i] == 0)
                .boxed()
                .toList();
        if (constant.isEmpty()) {
            return;
        }
        ExtendedMatrix means = scatter.tail().apply(scatter.head().deviations());
        List<Integer> differing =
                constant.stream().filter(i -> differs(means, i)).toList();
        if (differing.isEmpty()) {
            throw Fault.input("the within scatter is singular: constant in every record: " + names(constant))
                    .remedy(REMEDY);
        }
        throw Fault.input("the within scatter is singular: constant within each material, but different between them: "
                        + names(differing) + ", so the Fisher ratio would be infinite")
                .remedy("check whether the label was written into a channel; otherwise " + REMEDY);
    }

    private static boolean differs(ExtendedMatrix means, int column) {
        for (int k = 1; k < means.rows; k++) {
            if (!means.at(k, column).equals(means.at(0, column))) {
                return true;
            }
        }
        return false;
    }

    /** The refusal for pivots set aside. */
    Fault fault(Factor factor, double[] equilibration, double ridge) {
        List<Integer> dependent = factor.setAside();
        int p = factor.size();
        long degreesOfFreedom = scatter.degreesOfFreedom();
        String first = equation(factor, equilibration, dependent.get(0));
        String more = dependent.size() == 1
                ? ""
                : "; likewise a combination of others: " + names(dependent.subList(1, dependent.size()));
        if (ridge > 0) {
            return Fault.input("the within scatter is singular even with the ridge: " + first + more)
                    .found("ridge " + BigDecimal.valueOf(ridge).toString())
                    .remedy("give a larger ridge, such as 0.001, or leave the channels out");
        }
        if (p > degreesOfFreedom) {
            return Fault.input(
                            "the within scatter is singular: more channels than degrees of freedom within the materials; "
                                    + first + more)
                    .found(p + " channels, " + degreesOfFreedom + " degrees of freedom")
                    .expected("at most " + degreesOfFreedom + " channels")
                    .remedy("give more records, " + REMEDY.substring("give ".length()));
        }
        return Fault.input(
                        "the within scatter is singular: within each material " + first + " (up to a constant)" + more)
                .remedy(REMEDY);
    }

    /** "c3 = 2·c1 - c2". */
    private String equation(Factor factor, double[] equilibration, int k) {
        double[] scaled = factor.combination(k);
        double largest = 0;
        for (double c : scaled) {
            largest = Math.max(largest, Math.abs(c));
        }
        double negligible = NEGLIGIBLE_TERM * largest;
        List<Integer> terms = IntStream.range(0, k)
                .filter(i -> Math.abs(scaled[i]) > negligible)
                .boxed()
                .sorted(Comparator.comparingDouble(i -> -Math.abs(scaled[i])))
                .collect(Collectors.toCollection(ArrayList::new));
        if (terms.isEmpty()) {
            return name(k) + " does not vary";
        }
        int shown = Math.min(terms.size(), MOST_NAMED);
        StringBuilder text = new StringBuilder(name(k)).append(" =");
        terms.subList(0, shown).stream()
                .sorted()
                .forEach(i -> text.append(term(scaled[i] * (equilibration[i] / equilibration[k]), name(i))));
        if (shown < terms.size()) {
            text.append(" + smaller terms in ").append(terms.size() - shown).append(" more");
        }
        return text.toString().replace("= +", "=");
    }

    private static String term(double coefficient, String name) {
        BigDecimal size = new BigDecimal(Math.abs(coefficient)).round(SHOWN_DIGITS);
        String sign = coefficient < 0 ? " - " : " + ";
        if (size.compareTo(BigDecimal.ONE) == 0) {
            return sign + name;
        }
        BigDecimal plain = size.stripTrailingZeros();
        boolean readable = plain.precision() - plain.scale() > -4 && plain.precision() - plain.scale() < 8;
        return sign + (readable ? plain.toPlainString() : plain.toString()) + "·" + name;
    }

    private String names(List<Integer> outputs) {
        String shown = outputs.stream().limit(MOST_NAMED).map(this::name).collect(Collectors.joining(", "));
        return outputs.size() <= MOST_NAMED ? shown : shown + " and " + (outputs.size() - MOST_NAMED) + " more";
    }

    private String name(int output) {
        int[] inputs = scatter.tail().columns(output);
        List<String> channels = request.channelNames();
        if (inputs.length == 1) {
            return channels.get(inputs[0]);
        }
        return "tail output " + (output + 1)
                + (inputs.length == 0
                        ? ""
                        : " (" + channels.get(inputs[0]) + " to " + channels.get(inputs[inputs.length - 1]) + ")");
    }
}
