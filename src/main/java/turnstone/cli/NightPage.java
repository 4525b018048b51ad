package turnstone.cli;

import java.util.ArrayList;
import java.util.List;
import turnstone.ledger.PostOutcome;
import turnstone.night.Night;
import turnstone.night.VerdictRemarks;
import turnstone.night.Words;
import turnstone.plant.Plant;
import turnstone.trial.Decision;

/** The plain summary of a night; the verdict is its last line. */
final class NightPage {
    private NightPage() {}

    static List<String> of(Plant plant, Night.Result result) {
        List<String> lines = new ArrayList<>();
        lines.add(plant.name() + ", night of " + result.day());
        lines.add("");
        lines.add("ledger      " + (result.outcome() == PostOutcome.POSTED ? "posted" : "posted already, same records")
                + ", revision " + result.entry().revision() + ", sums "
                + Words.shortened(result.entry().momentsFingerprint()));
        lines.add("records     " + Words.number(result.entry().counts().read()) + " read = "
                + Words.number(result.entry().counts().accepted()) + " accepted + "
                + Words.number(result.entry().counts().noSignal()) + " no signal + "
                + Words.number(result.entry().counts().quarantinedTotal()) + " quarantined");
        result.entry()
                .counts()
                .quarantined()
                .forEach((reason, count) -> lines.add("            " + Words.number(count) + " " + reason));
        lines.add("candidate   " + Words.shortened(result.candidate().fingerprint()) + " from "
                + result.candidate().madeFrom().days().size() + " days, "
                + Words.number(result.candidate().madeFrom().records()) + " records, "
                + Words.number(result.candidate().madeFrom().showings()) + " showings; "
                + result.candidate().rank()
                + " axes, ridge " + Figures.shortest(result.candidate().ridge()));
        lines.add("");
        lines.addAll(result.verdict().text().lines().toList());
        lines.addAll(VerdictRemarks.of(plant, result.verdict()));
        lines.add("");
        lines.addAll(plant.cautions());
        lines.add("files of this run: " + result.run().path());
        if (result.released().isPresent()) {
            lines.add("released: journal entry " + result.released().get().number());
        } else if (result.verdict().decision() == Decision.RELEASE) {
            lines.add("to put it in service: turnstone release "
                    + Words.shortened(result.candidate().fingerprint()) + " --plant " + plant.file()
                    + " --reason TEXT");
        }
        lines.add("verdict: " + result.verdict().decision().label());
        return lines;
    }
}
