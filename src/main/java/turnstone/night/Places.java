package turnstone.night;

import java.net.URI;
import java.net.URISyntaxException;
import java.nio.file.Path;
import java.time.Clock;
import turnstone.audit.AuditJournal;
import turnstone.decide.Model;
import turnstone.fault.Fault;
import turnstone.ledger.Ledger;
import turnstone.plant.Plant;
import turnstone.plant.SigningSpec;
import turnstone.shelf.PublicKeyFile;
import turnstone.shelf.Shelf;
import turnstone.shelf.SigningRule;
import turnstone.store.LocalStore;
import turnstone.store.Store;

/** Opens the places that a plant file names: ledger, shelf, folder of runs. */
public final class Places {
    private Places() {}

    /**
     * The plant's ledger.
     *
     * @throws Fault of kind input, naming the fields, where it is kept with another count scale or head
     */
    public static Ledger ledger(Plant plant) {
        return Ledger.open(store(plant.ledger(), "ledger"), plant.countScale(), plant.head());
    }

    /**
     * The plant's shelf, with the plant's rule about signatures.
     *
     * @throws Fault of kind usage where the plant file names a public key that there is not
     */
    public static Shelf shelf(Plant plant) {
        return Shelf.open(
                        store(plant.shelf(), "shelf"),
                        Clock.systemUTC(),
                        (model, place) -> Model.read(model, place).fingerprint())
                .withRule(rule(plant.signing()));
    }

    /** The journal of bale and hand-sort results. */
    public static AuditJournal audits(Plant plant) {
        return AuditJournal.in(store(plant.audits(), "audits"), Clock.systemUTC());
    }

    private static SigningRule rule(SigningSpec spec) {
        SigningRule.Unsigned unsigned = spec.unsigned() == SigningSpec.Unsigned.REFUSED
                ? SigningRule.Unsigned.REFUSED
                : SigningRule.Unsigned.ALLOWED;
        return new SigningRule(unsigned, spec.publicKey().map(PublicKeyFile::read));
    }

    /** The folder of runs. */
    public static Path runs(Plant plant) {
        return path(plant.runs(), "runs");
    }

    private static Store store(String location, String key) {
        return new LocalStore(path(location, key));
    }

    private static Path path(String location, String key) {
        if (!location.matches("[a-zA-Z][a-zA-Z0-9+.-]+:.*")) {
            return Path.of(location);
        }
        try {
            URI uri = new URI(location);
            if ("file".equals(uri.getScheme())) {
                return Path.of(uri.getPath());
            }
        } catch (URISyntaxException e) {
            throw Fault.usage("not a path").at(key).found(location).because(e);
        }
        throw Fault.usage("this kind of place can't be published to")
                .at(key)
                .found(location)
                .expected("a path or a file: URI")
                .remedy("keep the " + key + " on a file system that is mounted");
    }
}
