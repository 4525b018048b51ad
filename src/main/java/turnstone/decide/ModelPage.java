package turnstone.decide;

import com.fasterxml.jackson.databind.JsonNode;
import java.util.List;
import java.util.Locale;
import java.util.TreeSet;
import java.util.stream.Collectors;

/** A model as a page of text for a person, 80 columns wide. */
public final class ModelPage {
    private static final int WIDTH = 80;
    private static final int BAR = 30;
    private static final int SHORT = 12;

    /** Below this a small change of the records may move the axes visibly: half of the digits of a double are gone. */
    private static final double POOR_CONDITION = 1e-8;

    private final Model model;
    private final StringBuilder page = new StringBuilder();

    private ModelPage(Model model) {
        this.model = model;
    }

    /** The page, lines ended by line feeds. */
    public static String of(Model model) {
        ModelPage page = new ModelPage(model);
        page.heading();
        page.origin();
        page.making();
        page.axes();
        page.materials();
        page.map();
        page.remarks();
        page.cautions();
        return page.page.toString();
    }

    private void heading() {
        line("Model " + brief(model.fingerprint()) + " (" + model.scope() + ")");
        paragraph(
                "",
                "A projection of " + model.channels().size() + " channels onto " + count(model.rank(), "axis", "axes")
                        + " that tells " + model.materials().size() + " materials apart"
                        + model.orientedTo()
                                .map(other -> ", oriented to model " + brief(other))
                                .orElse("") + ".");
        line("");
    }

    private void origin() {
        MadeFrom from = model.madeFrom();
        line("Made from");
        List<MadeFrom.Day> days = from.days();
        if (!days.isEmpty()) {
            String span = days.get(0).day()
                    + (days.size() > 1 ? " to " + days.get(days.size() - 1).day() : "");
            line("  " + count(days.size(), "ledger day", "ledger days") + ": " + span);
        }
        line("  " + count(from.records(), "record", "records")
                + (from.showings() > 0 ? " in " + count(from.showings(), "showing", "showings") : ""));
        TreeSet<String> instruments = from.parts().stream()
                .map(MadeFrom.Part::instrument)
                .filter(name -> !name.isEmpty())
                .collect(Collectors.toCollection(TreeSet::new));
        if (!instruments.isEmpty()) {
            paragraph(
                    "  ",
                    count(instruments.size(), "instrument", "instruments") + ": " + String.join(", ", instruments));
        }
        from.inputs().forEach(input -> line("  " + input));
        line("");
    }

    private void making() {
        line("How");
        JsonNode pretreatment = model.pretreatment();
        paragraph("  ", "head: " + PretreatmentWords.of(pretreatment.path("head")));
        paragraph("  ", "tail: " + PretreatmentWords.of(pretreatment.path("tail")));
        line("  ridge " + number(model.ridge()) + " of the mean within scatter; "
                + grouped(model.withinDegreesOfFreedom()) + " degrees of freedom within");
        double condition = model.reciprocalCondition();
        line("  reciprocal condition " + number(condition)
                + (condition < POOR_CONDITION ? ": poor, the axes hang on small differences" : ""));
        model.scaleLoss()
                .ifPresent(loss -> line(
                        loss == 0
                                ? "  counts hold the values without loss"
                                : "  counts round the values by up to " + number(loss) + " of a step"));
        String flag = model.unfamiliarBeyond().isPresent()
                ? "unfamiliar beyond distance "
                        + number(Math.sqrt(model.unfamiliarBeyond().getAsDouble()))
                        + (model.residual().isPresent() ? ", or with too much outside the axes" : "")
                : "no record is flagged unfamiliar";
        line("  " + flag);
        line("");
    }

    private void axes() {
        line("Axes           Fisher ratio   share");
        double[] ratios = model.fisherRatios();
        double[] shares = model.fisherShares();
        if (shares.length == 0) {
            line(String.format(Locale.ROOT, "  axis %-3d %17s  undefined", 1, number(ratios[0])));
        }
        for (int a = 0; a < shares.length; a++) {
            String bar = "#".repeat((int) Math.rint(shares[a] * BAR));
            line(String.format(
                            Locale.ROOT,
                            "  axis %-3d %17s  %5.1f %%  %s",
                            a + 1,
                            number(ratios[a]),
                            100 * shares[a],
                            bar)
                    .stripTrailing());
        }
        line("");
    }

    private void materials() {
        List<ModelMaterial> materials = model.materials();
        int width = materials.stream().mapToInt(m -> m.name().length()).max().orElseThrow();
        int column = Math.max(8, Math.min(24, width));
        line(String.format(
                Locale.ROOT,
                "%-" + (column + 4) + "s %13s %7s   %s",
                "Materials",
                "records",
                "prior",
                "nearest other"));
        for (int k = 0; k < materials.size(); k++) {
            ModelMaterial material = materials.get(k);
            int other = nearest(k);
            double distance = Math.sqrt(DecisionRule.squaredDistance(
                    material.position(), materials.get(other).position()));
            line(String.format(
                    Locale.ROOT,
                    "  %c %-" + column + "s %13s %7.3f   %s at %s",
                    PositionMap.letter(k),
                    material.name(),
                    grouped(material.records()),
                    material.decisionPrior(),
                    materials.get(other).name(),
                    number(distance)));
        }
        paragraph("  ", "Distances are in within-variance units: two materials at 4 or less overlap visibly.");
        line("");
    }

    private int nearest(int k) {
        List<ModelMaterial> materials = model.materials();
        int best = -1;
        double least = Double.POSITIVE_INFINITY;
        for (int other = 0; other < materials.size(); other++) {
            double square = DecisionRule.squaredDistance(
                    materials.get(k).position(), materials.get(other).position());
            if (other != k && square < least) {
                least = square;
                best = other;
            }
        }
        return best;
    }

    private void map() {
        line(
                model.rank() > 1
                        ? "Where they lie: axis 1 to the right, axis 2 upwards, + is the centre"
                        : "Where they lie on axis 1; + is the centre");
        line("");
        PositionMap.draw(model.materials().stream().map(ModelMaterial::position).toArray(double[][]::new))
                .forEach(row -> line(("    " + row).stripTrailing()));
        line("");
    }

    private void remarks() {
        if (!model.remarks().isEmpty()) {
            line("Remarks");
            model.remarks().forEach(remark -> paragraph("  ", remark));
            line("");
        }
    }

    private void cautions() {
        line("Mind");
        paragraph(
                "  ",
                "Nothing on this page says how well the model decides: a trial does, on trays that it has not seen,"
                        + " and a trial on trays is not a bale. Figures replace no prescribed test for hazardous materials.");
        paragraph(
                "  ",
                "Changing coefficients on a running sorter moves air valves: follow the machine maker's lock-out"
                        + " procedure.");
    }

    private void line(String text) {
        page.append(text).append('\n');
    }

    private void paragraph(String indent, String text) {
        StringBuilder row = new StringBuilder(indent);
        for (String word : text.split(" ", -1)) {
            boolean begun = row.length() > indent.length();
            if (begun && row.length() + 1 + word.length() > WIDTH) {
                line(row.toString());
                row = new StringBuilder(indent);
                begun = false;
            }
            row.append(begun ? " " : "").append(word);
        }
        line(row.toString());
    }

    private static String brief(String fingerprint) {
        return fingerprint.length() > SHORT ? fingerprint.substring(0, SHORT) : fingerprint;
    }

    private static String count(long number, String one, String many) {
        return grouped(number) + " " + (number == 1 ? one : many);
    }

    private static String grouped(long number) {
        return String.format(Locale.ROOT, "%,d", number).replace(',', ' ');
    }

    /** Four digits that a person can read. */
    private static String number(double value) {
        double size = Math.abs(value);
        if (value == 0) {
            return "0";
        }
        if (size < 1e-3 || size >= 1e6) {
            return String.format(Locale.ROOT, "%.2e", value);
        }
        int decimals = size >= 1000 ? 0 : size >= 100 ? 1 : size >= 10 ? 2 : size >= 1 ? 3 : 4;
        return String.format(Locale.ROOT, "%." + decimals + "f", value);
    }
}
