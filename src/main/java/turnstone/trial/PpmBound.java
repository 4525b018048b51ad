package turnstone.trial;

import com.fasterxml.jackson.databind.node.ObjectNode;
import java.util.Locale;
import java.util.OptionalDouble;
import turnstone.decide.Quantiles;
import turnstone.json.Json;
import turnstone.plant.PpmLimit;

/**
 * How much of a material may be in the product, by mass, as far as the showings can say.
 *
 * <p>With x of n records sent to the product stream, the upper Clopper–Pearson bound (Clopper and Pearson 1934) of ⌈x/e⌉ of ⌊n/e⌋, e the design
 * effect of showings: the clustered variance over the binomial one, at least {@value #LEAST_EFFECT}, from {@value #LEAST_NIGHTS} nights or
 * more. Beside it, free of that assumption, the bound on the share of showings with any such record, which is never less than their share of
 * records. A share p of the material is w·p/(w·p + all other mass in the product) of the product, the others taken as found.
 *
 * @param limit as the duty states it
 * @param nights pooled
 * @param showings of the material
 * @param records of the material
 * @param sent of these to the product stream
 * @param designEffect used; empty with too few nights
 * @param byRecords_ppm upper bound from records; empty with too few nights
 * @param byShowings_ppm upper bound from showings
 * @param moreShowings without such a record until the bound from records is under the limit; 0 where it is
 */
public record PpmBound(
        PpmLimit limit,
        int nights,
        int showings,
        long records,
        long sent,
        OptionalDouble designEffect,
        OptionalDouble byRecords_ppm,
        double byShowings_ppm,
        long moreShowings) {
    static final int LEAST_NIGHTS = 7;
    static final int MOST_DAYS = 28;
    static final double LEAST_EFFECT = 1.5;
    private static final double MILLION = 1e6;
    private static final long MOST_SHOWINGS = 1L << 40;

    /** From what was sent; {@code all} holds every material of the infeed, each with records. */
    static PpmBound of(PpmLimit limit, Sendings all, int nights) {
        Sendings.Part part = all.parts().stream()
                .filter(candidate -> candidate.material().equals(limit.material()))
                .findFirst()
                .orElseThrow();
        long sent = part.showings().stream().mapToLong(Sendings.Showing::sent).sum();
        long errant =
                part.showings().stream().filter(showing -> showing.sent() > 0).count();
        double otherMass = 0;
        for (Sendings.Part other : all.parts()) {
            otherMass += other.material().equals(limit.material()) ? 0 : other.massShare() * other.sentShare();
        }
        Product product = new Product(part.massShare(), otherMass);
        int count = part.showings().size();
        double byShowings = product.ppm(Quantiles.shareUpper(errant, count, limit.confidence()));
        if (nights < LEAST_NIGHTS) {
            OptionalDouble none = OptionalDouble.empty();
            return new PpmBound(limit, nights, count, part.records(), sent, none, none, byShowings, 0);
        }
        double effect = Math.max(LEAST_EFFECT, Math.max(effect(all, limit.material()), effect(all, "")));
        double bound = product.ppm(upper(sent, (double) part.records(), effect, limit.confidence()));
        return new PpmBound(
                limit,
                nights,
                count,
                part.records(),
                sent,
                OptionalDouble.of(effect),
                OptionalDouble.of(bound),
                byShowings,
                bound <= limit.most_ppm() ? 0 : more(limit, product, part, sent, effect));
    }

    /** Parts per million of the product that a share of the material makes. */
    private record Product(double massShare, double otherMass) {
        double ppm(double share) {
            double mass = massShare * share;
            return mass == 0 ? 0 : MILLION * mass / (mass + otherMass);
        }
    }

    private static double upper(long sent, double records, double effect, double confidence) {
        long of = Math.max(1, (long) Math.floor(records / effect));
        long hits = Math.min(of, (long) Math.ceil(sent / effect));
        return Quantiles.shareUpper(hits, of, confidence);
    }

    /** The design effect of what is sent of one material, or of all others than targets pooled; 0 where nothing is sent. */
    private static double effect(Sendings all, String only) {
        double clustered = 0;
        double binomial = 0;
        for (Sendings.Part part : all.parts()) {
            if (part.target()
                    || !(only.isEmpty() || part.material().equals(only))
                    || part.showings().size() < 2) {
                continue;
            }
            double share = part.sentShare();
            double squares = 0;
            for (Sendings.Showing showing : part.showings()) {
                double miss = showing.sent() - share * showing.records();
                squares += miss * miss;
            }
            clustered += squares * part.showings().size() / (part.showings().size() - 1);
            binomial += part.records() * share * (1 - share);
        }
        return binomial == 0 ? 0 : clustered / binomial;
    }

    private static long more(PpmLimit limit, Product product, Sendings.Part part, long sent, double effect) {
        double perShowing = (double) part.records() / part.showings().size();
        long low = 0;
        long high = 1;
        while (high < MOST_SHOWINGS && !under(limit, product, part.records() + high * perShowing, sent, effect)) {
            low = high;
            high *= 2;
        }
        while (high - low > 1) {
            long middle = low + (high - low) / 2;
            if (under(limit, product, part.records() + middle * perShowing, sent, effect)) {
                high = middle;
            } else {
                low = middle;
            }
        }
        return high;
    }

    private static boolean under(PpmLimit limit, Product product, double records, long sent, double effect) {
        return product.ppm(upper(sent, records, effect, limit.confidence())) <= limit.most_ppm();
    }

    /** For people, one sentence without a full stop. */
    public String text() {
        String size =
                String.format(Locale.ROOT, "%d of %d records, %d showings, %d nights", sent, records, showings, nights);
        String byShowings = String.format(Locale.ROOT, "by showings alone no more than %.0f ppm", byShowings_ppm);
        if (byRecords_ppm.isEmpty()) {
            return String.format(
                    Locale.ROOT,
                    "%s in the product: %s shown; a bound from records needs %d more nights (%s)",
                    limit.material(),
                    byShowings,
                    LEAST_NIGHTS - nights,
                    size);
        }
        String more = moreShowings == 0
                ? ""
                : String.format(
                        Locale.ROOT,
                        "; %.0f ppm needs about %d more showings without error",
                        limit.most_ppm(),
                        moreShowings);
        return String.format(
                Locale.ROOT,
                "%s in the product: no more than %.0f ppm shown%s; %s (%s, design effect %.1f)",
                limit.material(),
                byRecords_ppm.getAsDouble(),
                more,
                byShowings,
                size,
                designEffect.orElseThrow());
    }

    ObjectNode json() {
        ObjectNode node = Json.object()
                .put("material", limit.material())
                .put("most_ppm", limit.most_ppm())
                .put("confidence", limit.confidence())
                .put("nights", nights)
                .put("showings", showings)
                .put("records", records)
                .put("sent", sent);
        VerdictJson.put(node, "designEffect", designEffect);
        VerdictJson.put(node, "byRecords_ppm", byRecords_ppm);
        return node.put("byShowings_ppm", byShowings_ppm).put("moreShowings", moreShowings);
    }
}
