package turnstone.shelf;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.security.GeneralSecurityException;
import java.security.KeyFactory;
import java.security.PublicKey;
import java.security.spec.X509EncodedKeySpec;
import java.util.Base64;
import turnstone.fault.Fault;
import turnstone.json.Json;

/**
 * The key that checks signatures: Ed25519, as a file in PEM form (RFC 7468, label {@code PUBLIC KEY}) around its X.509 encoding.
 */
public final class PublicKeyFile {
    static final String ALGORITHM = "Ed25519";
    private static final String LABEL = "PUBLIC KEY";

    private final PublicKey key;

    PublicKeyFile(PublicKey key) {
        this.key = key;
    }

    /**
     * Reads a key file.
     *
     * @throws Fault of kind usage where it is not a public key of this kind; of kind storage where it can't be read
     */
    public static PublicKeyFile read(Path file) {
        String text = text(file);
        if (text.contains("PRIVATE KEY")) {
            throw Fault.usage("this is the private key; the public one is needed here")
                    .at(file.toString())
                    .remedy("give the file that ends in " + SigningKey.PUBLIC_ENDING);
        }
        try {
            return fromBase64(Pem.body(text, LABEL));
        } catch (IllegalArgumentException e) {
            throw Fault.usage("not a public key")
                    .at(file.toString())
                    .expected("an Ed25519 key between BEGIN " + LABEL + " and END " + LABEL)
                    .remedy("make one with: turnstone key --out FILE")
                    .because(e);
        }
    }

    static PublicKeyFile fromBase64(String encoded) {
        try {
            byte[] bytes = Base64.getDecoder().decode(encoded);
            return new PublicKeyFile(KeyFactory.getInstance(ALGORITHM).generatePublic(new X509EncodedKeySpec(bytes)));
        } catch (GeneralSecurityException e) {
            throw new IllegalArgumentException("not an Ed25519 key", e);
        }
    }

    static String text(Path file) {
        try {
            return Files.readString(file, StandardCharsets.US_ASCII);
        } catch (NoSuchFileException e) {
            throw Fault.usage("there is no key file").at(file.toString()).because(e);
        } catch (IOException e) {
            throw Fault.storage("the key file can't be read")
                    .at(file.toString())
                    .found(e.getMessage())
                    .because(e);
        }
    }

    /** What is signed for a model. */
    static byte[] signed(String fingerprint) {
        return fingerprint.getBytes(StandardCharsets.US_ASCII);
    }

    /** SHA-256 of the key's X.509 encoding: its name in messages. */
    public String fingerprint() {
        return Json.sha256(key.getEncoded());
    }

    PublicKey key() {
        return key;
    }

    String base64() {
        return Base64.getEncoder().encodeToString(key.getEncoded());
    }

    String pem() {
        return Pem.of(LABEL, key.getEncoded());
    }

    @Override
    public boolean equals(Object other) {
        return other instanceof PublicKeyFile file && file.base64().equals(base64());
    }

    @Override
    public int hashCode() {
        return base64().hashCode();
    }

    @Override
    public String toString() {
        return "key " + fingerprint().substring(0, 12);
    }
}
