package turnstone.cli;

import java.nio.file.Path;
import java.util.concurrent.Callable;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Option;
import turnstone.json.Json;
import turnstone.shelf.PublicKeyFile;
import turnstone.shelf.SigningKey;

/** {@code key}: makes a pair of keys for signatures. */
@Command(
        name = "key",
        description = {
            "Makes a pair of Ed25519 keys: FILE, which only its owner may read and which signs models,",
            "and FILE.public, which checks signatures and may be given to anybody."
        },
        footer = {"", "Example: turnstone key --out keys/shore"})
final class KeyCommand implements Callable<Integer> {
    private final Console console;

    @Mixin
    CommonOptions common;

    @Option(names = "--out", paramLabel = "FILE", required = true, description = "where the private key goes")
    Path out;

    KeyCommand(Console console) {
        this.console = console;
    }

    @Override
    public Integer call() {
        Path open = SigningKey.make(out);
        String fingerprint = PublicKeyFile.read(open).fingerprint();
        if (common.json) {
            console.json(Json.object()
                    .put("privateKey", out.toString())
                    .put("publicKey", open.toString())
                    .put("fingerprint", fingerprint));
            return 0;
        }
        console.say("private key  " + out + "  (its owner only; keep a copy in a safe place)");
        console.say("public key   " + open + "  " + ShelfLines.shortened(fingerprint));
        console.say("to have every release signed, write into the plant file:");
        console.say("  signing: {unsigned: refused, publicKey: " + open + ", privateKey: " + out + "}");
        return 0;
    }
}
