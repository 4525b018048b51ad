package turnstone.shelf;

import java.util.Optional;

/**
 * Which models may be put in service, as far as signatures go.
 *
 * @param unsigned whether a model may go in service without a signature
 * @param key whose signature counts; where it is empty any signature that holds does
 */
public record SigningRule(Unsigned unsigned, Optional<PublicKeyFile> key) {
    /** What becomes of a model that has no signature. */
    public enum Unsigned {
        /** It may be put in service. */
        ALLOWED,
        /** It may not. */
        REFUSED
    }

    /** Unsigned models may go in service; a signature that is given has to hold all the same. */
    public static final SigningRule NONE = new SigningRule(Unsigned.ALLOWED, Optional.empty());

    /** Whether this is a signature of that model by a key that counts. */
    boolean accepts(ModelSignature signature, String fingerprint) {
        return key.map(signature.key()::equals).orElse(true) && signature.holdsFor(fingerprint);
    }
}
