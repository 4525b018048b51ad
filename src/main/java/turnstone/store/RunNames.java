package turnstone.store;

import java.util.UUID;

/** Names that no other run, process or machine makes: 128 random bits in hexadecimal digits. Never part of canonical content. */
public final class RunNames {
    private RunNames() {}

    /** A new name. */
    public static String fresh() {
        return UUID.randomUUID().toString().replace("-", "");
    }
}
