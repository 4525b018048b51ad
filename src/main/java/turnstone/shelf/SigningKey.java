package turnstone.shelf;

import java.io.IOException;
import java.io.OutputStream;
import java.nio.channels.Channels;
import java.nio.charset.StandardCharsets;
import java.nio.file.FileAlreadyExistsException;
import java.nio.file.Files;
import java.nio.file.NoSuchFileException;
import java.nio.file.Path;
import java.nio.file.StandardOpenOption;
import java.nio.file.attribute.PosixFilePermission;
import java.nio.file.attribute.PosixFilePermissions;
import java.security.GeneralSecurityException;
import java.security.KeyFactory;
import java.security.KeyPair;
import java.security.KeyPairGenerator;
import java.security.PrivateKey;
import java.security.Signature;
import java.security.spec.PKCS8EncodedKeySpec;
import java.util.Base64;
import java.util.EnumSet;
import java.util.Set;
import turnstone.fault.Fault;

/**
 * The key that signs models: Ed25519, as a file in PEM form (RFC 7468) around its PKCS #8 encoding, with the public key in the same file,
 * so that it is known whose signature is made. Only the file's owner may read it: with any other permission it is not used.
 */
public final class SigningKey {
    static final String PUBLIC_ENDING = ".public";
    private static final String LABEL = "PRIVATE KEY";
    private static final Set<PosixFilePermission> OWNER_ONLY =
            EnumSet.of(PosixFilePermission.OWNER_READ, PosixFilePermission.OWNER_WRITE);

    private final PrivateKey key;
    private final PublicKeyFile publicKey;

    private SigningKey(PrivateKey key, PublicKeyFile publicKey) {
        this.key = key;
        this.publicKey = publicKey;
    }

    /**
     * Makes a pair of keys: the private one in {@code file}, readable by its owner only, the public one beside it, its name ended by
     * {@code .public}.
     *
     * @return the file of the public key
     * @throws Fault of kind input where one of the files is there already; of kind storage where they can't be written
     */
    public static Path make(Path file) {
        Path beside = Path.of(file + PUBLIC_ENDING);
        for (Path taken : new Path[] {file, beside}) {
            if (Files.exists(taken)) {
                throw there(taken);
            }
        }
        try {
            KeyPair pair = KeyPairGenerator.getInstance(PublicKeyFile.ALGORITHM).generateKeyPair();
            String open = new PublicKeyFile(pair.getPublic()).pem();
            write(file, Pem.of(LABEL, pair.getPrivate().getEncoded()) + open, OWNER_ONLY);
            write(beside, open, PosixFilePermissions.fromString("rw-r--r--"));
            return beside;
        } catch (FileAlreadyExistsException e) {
            throw there(Path.of(e.getFile())).because(e);
        } catch (UnsupportedOperationException e) {
            throw unprotected(file).because(e);
        } catch (IOException e) {
            throw Fault.storage("the key can't be written")
                    .at(file.toString())
                    .found(e)
                    .because(e);
        } catch (GeneralSecurityException e) {
            throw new IllegalStateException("every Java from 15 on has Ed25519", e);
        }
    }

    /**
     * Reads a private key.
     *
     * @throws Fault of kind usage where others than its owner may read the file, or it is no such key; of kind storage where it can't be
     *     read
     */
    public static SigningKey read(Path file) {
        requirePrivate(file);
        String text = PublicKeyFile.text(file);
        try {
            byte[] bytes = Base64.getDecoder().decode(Pem.body(text, LABEL));
            PrivateKey key =
                    KeyFactory.getInstance(PublicKeyFile.ALGORITHM).generatePrivate(new PKCS8EncodedKeySpec(bytes));
            SigningKey signing = new SigningKey(key, PublicKeyFile.fromBase64(Pem.body(text, "PUBLIC KEY")));
            String trial = "0".repeat(64);
            if (!signing.sign(trial).holdsFor(trial)) {
                throw new IllegalArgumentException("the two keys do not belong together");
            }
            return signing;
        } catch (GeneralSecurityException | IllegalArgumentException e) {
            throw Fault.usage("not a private key that this program made")
                    .at(file.toString())
                    .expected("an Ed25519 key and its public key")
                    .remedy("make one with: turnstone key --out FILE")
                    .because(e);
        }
    }

    /** The signature of a model. */
    public ModelSignature sign(String fingerprint) {
        try {
            Signature signature = Signature.getInstance(PublicKeyFile.ALGORITHM);
            signature.initSign(key);
            signature.update(PublicKeyFile.signed(fingerprint));
            return new ModelSignature(publicKey, Base64.getEncoder().encodeToString(signature.sign()));
        } catch (GeneralSecurityException e) {
            throw new IllegalStateException("a key that was read can't sign", e);
        }
    }

    /** The key that checks its signatures. */
    public PublicKeyFile publicKey() {
        return publicKey;
    }

    private static void requirePrivate(Path file) {
        Set<PosixFilePermission> permissions;
        try {
            permissions = EnumSet.noneOf(PosixFilePermission.class);
            permissions.addAll(Files.getPosixFilePermissions(file));
        } catch (NoSuchFileException e) {
            throw Fault.usage("there is no key file").at(file.toString()).because(e);
        } catch (UnsupportedOperationException e) {
            throw unprotected(file).because(e);
        } catch (IOException e) {
            throw Fault.storage("the permissions of the key file can't be read")
                    .at(file.toString())
                    .found(e)
                    .because(e);
        }
        String found = PosixFilePermissions.toString(permissions);
        permissions.removeIf(permission -> permission.name().startsWith("OWNER_"));
        if (!permissions.isEmpty()) {
            throw Fault.usage("others than its owner may use this private key, so it is not used")
                    .at(file.toString())
                    .found("permissions " + found)
                    .expected("rw-------")
                    .remedy("chmod 600 it; if others may have read it, make another key");
        }
    }

    private static void write(Path file, String text, Set<PosixFilePermission> permissions) throws IOException {
        Set<StandardOpenOption> anew = EnumSet.of(StandardOpenOption.CREATE_NEW, StandardOpenOption.WRITE);
        // The permissions are there from the first moment: nobody can open the file in between.
        try (OutputStream out = Channels.newOutputStream(
                Files.newByteChannel(file, anew, PosixFilePermissions.asFileAttribute(permissions)))) {
            out.write(text.getBytes(StandardCharsets.US_ASCII));
        }
    }

    private static Fault there(Path file) {
        return Fault.input("there is a file already, and a key is never replaced")
                .at(file.toString())
                .remedy("name another file");
    }

    private static Fault unprotected(Path file) {
        return Fault.usage("this file system can't tell who may read a file, so a private key is not safe on it")
                .at(file.toString())
                .remedy("keep the key on a file system with owner permissions");
    }
}
