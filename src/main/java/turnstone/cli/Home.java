package turnstone.cli;

import java.nio.file.Path;

/** The checkout or installation, as the launcher says. */
final class Home {
    private Home() {}

    static Path folder() {
        return Path.of(System.getProperty("turnstone.home", "."))
                .toAbsolutePath()
                .normalize();
    }
}
