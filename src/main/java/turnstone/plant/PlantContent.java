package turnstone.plant;

import java.nio.file.Path;
import java.util.Collections;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Instrument;
import turnstone.measure.TailSpec;

/** What {@link Plant} gives out, each part as its accessor there says. */
record PlantContent(
        Path file,
        String name,
        List<Material> materials,
        Map<String, List<String>> groups,
        List<String> sorters,
        List<Instrument> instruments,
        SourceSpec records,
        RecordColumns recordColumns,
        Optional<ReferenceSpec> references,
        HeadSpec head,
        TailSpec tail,
        CountScale countScale,
        TrayDeal trayDeal,
        String ledger,
        String shelf,
        String runs,
        double quarantineLimit,
        RefitRecipe refit,
        long perTask_bytes,
        ProjectSpec project,
        List<Duty> duties,
        ReleaseRule release,
        SigningSpec signing,
        String audits,
        List<String> cautions) {
    PlantContent {
        materials = List.copyOf(materials);
        groups = Collections.unmodifiableMap(new LinkedHashMap<>(groups));
        sorters = List.copyOf(sorters);
        instruments = List.copyOf(instruments);
        duties = List.copyOf(duties);
        cautions = List.copyOf(cautions);
    }
}
