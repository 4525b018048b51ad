package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;
import com.fasterxml.jackson.databind.node.ObjectNode;
import java.security.GeneralSecurityException;
import java.security.Signature;
import java.util.Base64;
import turnstone.json.Json;

/**
 * An Ed25519 signature (RFC 8032) over the 64 hexadecimal digits of a model's fingerprint, in US-ASCII; the fingerprint covers the whole
 * content of the model.
 *
 * @param key whose it is
 * @param value the 64 bytes, in Base64
 */
public record ModelSignature(PublicKeyFile key, String value) {
    /** Whether this is the key's signature of that model. */
    public boolean holdsFor(String fingerprint) {
        try {
            Signature check = Signature.getInstance(PublicKeyFile.ALGORITHM);
            check.initVerify(key.key());
            check.update(PublicKeyFile.signed(fingerprint));
            return check.verify(Base64.getDecoder().decode(value));
        } catch (GeneralSecurityException | IllegalArgumentException notOne) {
            return false;
        }
    }

    ObjectNode json() {
        return Json.object().put("publicKey", key.base64()).put("value", value);
    }

    static ModelSignature fromJson(JsonNode node) {
        return new ModelSignature(
                PublicKeyFile.fromBase64(node.path("publicKey").asText()),
                node.path("value").asText());
    }
}
