package turnstone.trial;

import java.util.List;
import turnstone.plant.Requirement;

/**
 * Decision purity and decision recovery as functions of the shares sent, with their slopes.
 *
 * <p>With w the mass share of a material in the infeed, p the share of its records sent to the product stream, T the targets:
 * A = Σ_T w·p (target sent), C = Σ_others w·p (other mass sent), W = Σ_T w. Recovery = A/W, slope w/W for targets, 0 for others.
 * Purity = A/(A + C), slope w·C/(A + C)² for targets, −w·A/(A + C)² for others.
 */
final class MassFigure {
    private final Requirement.Figure figure;
    private final List<Sendings.Part> parts;
    private final double targetSent;
    private final double otherSent;
    private final double targetShare;

    MassFigure(Requirement.Figure figure, Sendings sendings) {
        this.figure = figure;
        this.parts = sendings.parts();
        double a = 0;
        double c = 0;
        double w = 0;
        for (Sendings.Part part : parts) {
            double sent = part.massShare() * part.sentShare();
            if (part.target()) {
                a += sent;
                w += part.massShare();
            } else {
                c += sent;
            }
        }
        targetSent = a;
        otherSent = c;
        targetShare = w;
    }

    /** The figure where half a record more of every material was sent, and half a record more was not: never 0 or 1. */
    static double withHalfARecord(Requirement.Figure figure, Sendings sendings) {
        double a = 0;
        double c = 0;
        double w = 0;
        for (Sendings.Part part : sendings.parts()) {
            double sent = part.massShare() * (part.sentShare() * part.records() + 0.5) / (part.records() + 1);
            a += part.target() ? sent : 0;
            c += part.target() ? 0 : sent;
            w += part.target() ? part.massShare() : 0;
        }
        return figure == Requirement.Figure.DECISION_RECOVERY ? a / w : a / (a + c);
    }

    /** NaN where nothing was sent (purity) or no target is in the infeed (recovery). */
    double value() {
        return switch (figure) {
            case DECISION_RECOVERY -> targetSent / targetShare;
            case DECISION_PURITY -> targetSent / (targetSent + otherSent);
        };
    }

    /** The slope of the figure with the share sent of this material. */
    double slope(Sendings.Part part) {
        double sent = targetSent + otherSent;
        return switch (figure) {
            case DECISION_RECOVERY -> part.target() ? part.massShare() / targetShare : 0;
            case DECISION_PURITY ->
                part.target()
                        ? part.massShare() * otherSent / (sent * sent)
                        : -part.massShare() * targetSent / (sent * sent);
        };
    }

    /** The slope of the figure with the mass share of this material; the figure of a mix that is scaled as a whole stays as it is. */
    double mixSlope(Sendings.Part part) {
        double sent = targetSent + otherSent;
        return switch (figure) {
            case DECISION_RECOVERY -> part.target() ? (part.sentShare() - value()) / targetShare : 0;
            case DECISION_PURITY -> part.sentShare() * (part.target() ? otherSent : -targetSent) / (sent * sent);
        };
    }

    /**
     * The bound where no showing of the trial shows an error, or none a success.
     *
     * <p>Where none of K showings of a material shows any such record, the share q of showings that would satisfies
     * Π(1 − q)^K ≥ α, so Σ K·q ≤ ln(1/α), and Σ v·q ≤ ln(1/α)·max(v/K) for any weights v ≥ 0: the rule of three, by showings. A share of
     * records is at most the share of showings. For purity the other mass is taken as found.
     */
    double boundWithoutExample(double alpha) {
        double reach = StrictMath.log(1 / alpha);
        boolean perfect = value() == 1;
        double most = 0;
        for (Sendings.Part part : parts) {
            boolean errs = part.target() != (perfect && figure == Requirement.Figure.DECISION_PURITY);
            if (errs) {
                most = Math.max(most, part.massShare() / part.showings().size() * reach);
            }
        }
        return switch (figure) {
            case DECISION_RECOVERY -> {
                double share = Math.min(1, most / targetShare);
                yield perfect ? 1 - share : share;
            }
            case DECISION_PURITY -> perfect ? targetSent / (targetSent + most) : most / (most + otherSent);
        };
    }

    /** How far the figures of two sides could lie apart where no showing shows a difference: the same rule, linearised. */
    double reachWithoutExample(double alpha) {
        double most = 0;
        for (Sendings.Part part : parts) {
            most = Math.max(most, Math.abs(slope(part)) / part.showings().size());
        }
        return Math.min(1, StrictMath.log(1 / alpha) * most);
    }
}
