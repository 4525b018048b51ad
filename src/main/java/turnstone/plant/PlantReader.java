package turnstone.plant;

import java.nio.file.Path;
import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import turnstone.measure.HeadSpec;
import turnstone.measure.Instrument;

/** Reads a plant file: the form first, then what hangs together. */
final class PlantReader {
    private static final double USUAL_QUARANTINE_LIMIT = 0.02;
    private static final long USUAL_BYTES_PER_TASK = 256L << 20;

    private final Path file;
    private final Entry root;

    private PlantReader(Path file, Entry root) {
        this.file = file;
        this.root = root;
    }

    static PlantContent read(Path file) {
        PlantText text = PlantText.read(file);
        PlantSchema.load().check(text);
        return new PlantReader(file, text.root()).content();
    }

    private PlantContent content() {
        Path folder = file.toAbsolutePath().normalize().getParent();
        List<Material> materials = materials();
        List<String> names = materials.stream().map(Material::name).toList();
        List<String> sorters = Known.once(root.at("sorters").items(), "sorter");
        SourceReader sources = new SourceReader(folder);
        RecordColumns columns = sources.recordColumns(root.at("records"));
        Optional<ReferenceSpec> references = root.optional("references").map(sources::references);
        checkReferenceKeys(columns, references);
        OpticsReader optics = new OpticsReader(folder, sorters);
        double[] axis_nm = optics.axis(root);
        int channels = axis_nm.length > 0 ? axis_nm.length : root.at("channels").whole();
        List<Instrument> instruments = optics.instruments(root, channels);
        HeadSpec head = PretreatmentReader.head(root, axis_nm, channels, instruments, references);
        DutyReader duties = new DutyReader(materials, sorters);
        Map<String, List<String>> groups = duties.groups(root);
        return new PlantContent(
                file,
                root.at("name").text(),
                materials,
                groups,
                sorters,
                instruments,
                sources.source(root.at("records")),
                columns,
                references,
                head,
                PretreatmentReader.tail(root, head.outputs()),
                PretreatmentReader.countScale(root, folder, head.outputs()),
                trayDeal(names),
                sources.resolved(root.at("ledger").text()),
                sources.resolved(root.at("shelf").text()),
                sources.resolved(root.at("runs").text()),
                root.optional("quarantine")
                        .map(entry -> entry.number("limitShare", USUAL_QUARANTINE_LIMIT))
                        .orElse(USUAL_QUARANTINE_LIMIT),
                RefitReader.recipe(root, names, duties),
                bytesPerTask(),
                project(),
                duties.duties(root, groups),
                release(),
                signing(),
                sources.resolved(root.text("audits", "audits")),
                root.optional("cautions").map(Entry::texts).orElse(List.of()));
    }

    private ReleaseRule release() {
        return ReleaseRule.of(root.text("release", "by hand"));
    }

    private SigningSpec signing() {
        Optional<Entry> signing = root.optional("signing");
        SigningSpec spec = new SigningSpec(
                SigningSpec.Unsigned.of(
                        signing.map(entry -> entry.text("unsigned", "allowed")).orElse("allowed")),
                signing.flatMap(entry -> entry.text("publicKey")).map(this::besideFile),
                signing.flatMap(entry -> entry.text("privateKey")).map(this::besideFile));
        if (spec.unsigned() == SigningSpec.Unsigned.REFUSED) {
            Entry entry = signing.orElseThrow();
            if (spec.publicKey().isEmpty()) {
                throw entry.fault("where unsigned models are refused, it has to be known whose signature counts")
                        .found("no publicKey")
                        .expected("signing.publicKey");
            }
            if (release() == ReleaseRule.AUTOMATIC && spec.privateKey().isEmpty()) {
                throw entry.fault("a night that releases has to sign where unsigned models are refused")
                        .found("release: automatic and no privateKey")
                        .expected("signing.privateKey")
                        .remedy("name the private key, or release by hand");
            }
        }
        return spec;
    }

    private Path besideFile(String path) {
        return file.toAbsolutePath().normalize().getParent().resolve(path);
    }

    private List<Material> materials() {
        List<Material> materials = new ArrayList<>();
        for (Entry entry : root.at("materials").items()) {
            String name = entry.at("name").text();
            if (materials.stream().anyMatch(material -> material.name().equals(name))) {
                throw entry.fault("material `" + name + "` is given twice");
            }
            OptionalDouble mass = entry.optional("grams_per_cm2")
                    .map(value -> OptionalDouble.of(value.number()))
                    .orElse(OptionalDouble.empty());
            materials.add(new Material(name, mass, entry.text("note")));
        }
        return materials;
    }

    private void checkReferenceKeys(RecordColumns columns, Optional<ReferenceSpec> references) {
        if (references.isPresent()
                && (columns.beltColumn().isEmpty() || columns.time_ms().isEmpty())) {
            throw root.at("records")
                    .fault("with references the records need columns for belt column and time")
                    .found(columns.beltColumn().isEmpty() ? "no columns.beltColumn" : "no columns.time_ms")
                    .expected("columns.beltColumn and columns.time_ms");
        }
    }

    private TrayDeal trayDeal(List<String> materials) {
        Optional<Entry> groups = root.optional("trayGroups");
        int count =
                groups.map(entry -> entry.whole("count", TrayDeal.MOST_GROUPS)).orElse(TrayDeal.MOST_GROUPS);
        Map<String, Map<String, Integer>> listed = new HashMap<>();
        Optional<Entry> list = groups.flatMap(entry -> entry.optional("listed"));
        for (String material : list.map(Entry::keys).orElse(List.of())) {
            Entry trays = list.orElseThrow().at(material);
            Known.name(trays, material, materials, "material");
            Map<String, Integer> byTray = new HashMap<>();
            for (String tray : trays.keys()) {
                int group = trays.at(tray).whole();
                if (group >= count) {
                    throw trays.at(tray)
                            .fault("there is no such tray group")
                            .found(group)
                            .expected("0 to " + (count - 1));
                }
                byTray.put(tray, group);
            }
            listed.put(material, byTray);
        }
        return new TrayDeal(count, listed);
    }

    private long bytesPerTask() {
        return root.optional("memory")
                .flatMap(entry -> entry.optional("perTask_bytes"))
                .map(entry -> entry.node().longValue())
                .orElse(USUAL_BYTES_PER_TASK);
    }

    private ProjectSpec project() {
        Optional<Entry> project = root.optional("project");
        return new ProjectSpec(
                project.flatMap(entry -> entry.on("write")).orElse(true) ? ProjectSpec.Write.ON : ProjectSpec.Write.OFF,
                TableFormat.of(project.flatMap(entry -> entry.text("form")).orElse("parquet")));
    }
}
