package turnstone.sample;

import java.math.BigDecimal;
import java.nio.file.Path;
import java.time.LocalDate;
import java.util.List;

/** Writes the plant file of the sample. */
final class SamplePlantFile {
    private static final String HEAD = """
            # An invented plant: nothing here is measured data. conf/plant.yaml explains the keys.
            plantFile: 1
            name: Shore (invented)
            """;

    private static final String MIDDLE = """
            pretreatment:
              input: counts
              head: {saturatedAt: 16383, deadAtOrBelow: 0, resample: on, floor: 0.001, noSignalBelow: 0.06, log: on, snv: on, snvSpreadFloor: 0.001}
              tail:
                - savitzkyGolay: {window: 9, order: 2, derivative: 1}
            countScale: {offset: 0, step: 0.00001, precision: coarse}
            trayGroups: {count: 8}
            ledger: ledger
            shelf: shelf
            runs: runs
            quarantine: {limitShare: 0.02}
            refit:
              window_days: 28
              balance: {instruments: equal, materials: equal}
              ridge: 0.0001
              rank: 0
              decisionPrior: equal
              unfamiliarShare: 0.01
            project: {write: on, form: parquet}
            """;

    private static final String DUTIES = """
            groups:
              - {name: polyolefin, materials: [PE-HD, PE-LD, PP]}
            duties:
              - name: PET bottles to bale
                targets: [PET bottle]
                productStream: ejected
                infeedMix: {PET bottle: 0.42, PET tray: 0.14, PE-HD: 0.12, PE-LD: 0.04, PP: 0.12, PS: 0.05, PVC: 0.02, ABS: 0.03, PA: 0.02, fibre: 0.04}
                requirements:
                  - {figure: decision purity, unseen: tray, least: 0.90, bound: lower, confidence: 0.95}
                  - {figure: decision recovery, unseen: tray, least: 0.90, bound: lower, confidence: 0.95}
                  - {figure: decision purity, unseen: machine, least: 0.88, bound: point}
              - name: polyolefins kept
                targets: [polyolefin]
                productStream: passed
                infeedMix: {PET bottle: 0.08, PET tray: 0.05, PE-HD: 0.32, PE-LD: 0.16, PP: 0.26, PS: 0.04, PVC: 0.02, ABS: 0.03, PA: 0.02, fibre: 0.02}
                requirements:
                  - {figure: decision purity, unseen: tray, least: 0.90, bound: lower, confidence: 0.95}
                  - {figure: decision recovery, unseen: tray, least: 0.85, bound: lower, confidence: 0.95}
            release: by hand
            signing: {unsigned: allowed}
            """;

    private SamplePlantFile() {}

    static String text(SamplePlant plant, Fleet fleet, Path folder) {
        StringBuilder text = new StringBuilder(HEAD);
        text.append("materials:\n");
        for (Substance substance : Substance.ALL) {
            text.append("  - {name: ")
                    .append(substance.name())
                    .append(", grams_per_cm2: ")
                    .append(substance.grams_per_cm2())
                    .append("}\n");
        }
        text.append("sorters: [").append(String.join(", ", plant.sorters())).append("]\n");
        text.append("instruments:\n");
        List<LocalDate> nights = plant.nights();
        for (int sorter = 0; sorter < plant.sorters().size(); sorter++) {
            instrument(text, plant, fleet, sorter, 0);
            if (Traps.newCamera(sorter, nights.size() - 1)) {
                instrument(text, plant, fleet, sorter, Traps.NEW_CAMERA_NIGHT);
            }
        }
        text.append("axis: {first_nm: 910, last_nm: 1690, channels: ")
                .append(plant.size().channels())
                .append("}\n");
        sources(text, folder);
        return text.append(MIDDLE).append(DUTIES).toString();
    }

    private static void instrument(StringBuilder text, SamplePlant plant, Fleet fleet, int sorter, int night) {
        int[] ends = fleet.ends_tenths(sorter, night);
        // Optics are known from before the first night.
        LocalDate since = night == 0
                ? plant.nights().get(0).withDayOfMonth(1)
                : plant.nights().get(night);
        text.append("  - {sorter: ")
                .append(plant.sorters().get(sorter))
                .append(", since: ")
                .append(since)
                .append(", wavelengths: {first_nm: ")
                .append(BigDecimal.valueOf(ends[0], 1).toPlainString())
                .append(", last_nm: ")
                .append(BigDecimal.valueOf(ends[1], 1).toPlainString())
                .append(", channels: ")
                .append(plant.size().channels())
                .append("}}\n");
    }

    private static void sources(StringBuilder text, Path folder) {
        text.append("records:\n  path: ").append(quoted(folder, "records/{day}"));
        text.append(
                        "\n  format: parquet\n  layout: {array: counts}\n  columns: {day: day, sorter: sorter, showing: showing, tray: tray, material: material,")
                .append(" piece: piece, beltColumn: belt_column, time_ms: time_ms}\n");
        text.append("references:\n  path: ").append(quoted(folder, "references"));
        text.append("\n  format: parquet\n  layout: {array: counts}\n")
                .append("  columns: {kind: kind, sorter: sorter, beltColumn: belt_column, time_ms: time_ms}\n")
                .append("  dark: dark\n  white: white\n  maxAge_hours: 12\n");
    }

    private static String quoted(Path folder, String name) {
        String path = folder.toString().isEmpty() ? name : folder.toString().replace('\\', '/') + "/" + name;
        return "\"" + path.replace("\"", "\\\"") + "\"";
    }
}
