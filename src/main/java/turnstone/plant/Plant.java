package turnstone.plant;

import java.nio.file.Path;
import java.time.LocalDate;
import java.util.Comparator;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import turnstone.fault.Fault;
import turnstone.measure.CountScale;
import turnstone.measure.HeadSpec;
import turnstone.measure.Instrument;
import turnstone.measure.TailSpec;

/**
 * Everything that a plant file says, checked and with the defaults filled in. Immutable.
 *
 * <p>Paths in it are absolute: those in the file are relative to the file's folder. The annotated example {@code conf/plant.yaml} has every key.
 */
public final class Plant {
    private final PlantContent content;
    private final List<String> materialNames;
    private final String fingerprint;

    Plant(PlantContent content) {
        this.content = content;
        this.materialNames = content.materials().stream().map(Material::name).toList();
        this.fingerprint = PlantFingerprint.of(content);
    }

    /**
     * Reads a plant file.
     *
     * @throws Fault of kind usage that names the file, the line, the key, what was found and what was expected, for the first thing that is not right; of
     *     kind storage where the file can't be read
     */
    public static Plant read(Path yaml) {
        return new Plant(PlantReader.read(yaml));
    }

    /** The plant file itself. */
    public Path file() {
        return content.file();
    }

    /** The plant's name. */
    public String name() {
        return content.name();
    }

    /** The materials; their order breaks ties. */
    public List<Material> materials() {
        return content.materials();
    }

    /** The names of the materials, in order. */
    public List<String> materialNames() {
        return materialNames;
    }

    /** Named groups of materials that duties may aim at: name to materials in plant order. */
    public Map<String, List<String>> groups() {
        return content.groups();
    }

    /** The sorters, in order. */
    public List<String> sorters() {
        return content.sorters();
    }

    /** The instruments, in the file's order. */
    public List<Instrument> instruments() {
        return content.instruments();
    }

    /** The instrument of a sorter on a day: of those since that day or earlier, the newest. */
    public Optional<Instrument> instrument(String sorter, LocalDate day) {
        return content.instruments().stream()
                .filter(instrument -> instrument.sorter().equals(sorter))
                .filter(instrument -> !instrument.since().isAfter(day))
                .max(Comparator.comparing(Instrument::since));
    }

    /** The plant's wavelength axis in nm, ascending; empty where only the number of channels is given. */
    public double[] axis_nm() {
        return content.head().axis_nm();
    }

    /** Channels of the plant's axis: what the head works on after resampling, before its mask. */
    public int channels() {
        return content.head().channels();
    }

    /** Where the records are. */
    public SourceSpec records() {
        return content.records();
    }

    /** The names of the records' key columns. */
    public RecordColumns recordColumns() {
        return content.recordColumns();
    }

    /** Where dark and white are; empty where the records need none. */
    public Optional<ReferenceSpec> references() {
        return content.references();
    }

    /** The steps for each record. */
    public HeadSpec head() {
        return content.head();
    }

    /** The steps for the sums; they fit the head's outputs. */
    public TailSpec tail() {
        return content.tail();
    }

    /** One channel for each output of the head. */
    public CountScale countScale() {
        return content.countScale();
    }

    /** Groups that trays are dealt into, 1 to 8. */
    public int trayGroups() {
        return content.trayDeal().count();
    }

    /** The group of a tray, from 0. */
    public int trayGroup(String material, String tray) {
        return content.trayDeal().group(material, tray);
    }

    /** The rule and the exceptions behind {@link #trayGroup}. */
    public TrayDeal trayDeal() {
        return content.trayDeal();
    }

    /** Where the ledger is: absolute path or URI. */
    public String ledger() {
        return content.ledger();
    }

    /** Where the shelf is: absolute path or URI. */
    public String shelf() {
        return content.shelf();
    }

    /** Where runs leave their results: absolute path or URI. */
    public String runs() {
        return content.runs();
    }

    /** The largest share of a day's records that may be quarantined, 0 to 1. */
    public double quarantineLimit() {
        return content.quarantineLimit();
    }

    /** How a candidate is made. */
    public RefitRecipe refit() {
        return content.refit();
    }

    /** The bound on what a task holds for its sums, bytes. */
    public long perTask_bytes() {
        return content.perTask_bytes();
    }

    /** Whether the night writes positions and decisions. */
    public ProjectSpec project() {
        return content.project();
    }

    /** The duties, at least one. */
    public List<Duty> duties() {
        return content.duties();
    }

    /** Who puts a candidate in service. */
    public ReleaseRule release() {
        return content.release();
    }

    /** Whether models have to be signed, and by whom. */
    public SigningSpec signing() {
        return content.signing();
    }

    /** Where the journal of bale and hand-sort results is: absolute path or URI. */
    public String audits() {
        return content.audits();
    }

    /** Sentences to print beside figures. */
    public List<String> cautions() {
        return content.cautions();
    }

    /**
     * SHA-256 of what changes numbers: materials, instruments, head, tail, count scale, tray groups, refit and duties; not of names of files, columns, memory,
     * release or cautions.
     */
    public String fingerprint() {
        return fingerprint;
    }
}
