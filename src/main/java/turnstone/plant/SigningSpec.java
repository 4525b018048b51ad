package turnstone.plant;

import java.nio.file.Path;
import java.util.Optional;

/**
 * What the plant file says about signatures.
 *
 * @param unsigned whether a model may go in service without one
 * @param publicKey file of the key whose signatures count, absolute; given where unsigned models are refused
 * @param privateKey file of the key that the night signs with, and a release by hand that names no other; absolute
 */
public record SigningSpec(Unsigned unsigned, Optional<Path> publicKey, Optional<Path> privateKey) {
    /** What becomes of a model without a signature. */
    public enum Unsigned {
        /** It may be put in service. */
        ALLOWED,
        /** It may not. */
        REFUSED;

        static Unsigned of(String word) {
            return Words.constant(Unsigned.class, word);
        }
    }
}
