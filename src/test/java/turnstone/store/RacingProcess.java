package turnstone.store;

import java.io.BufferedReader;
import java.io.IOException;
import java.io.InputStreamReader;
import java.nio.charset.StandardCharsets;
import java.nio.file.Path;

/** The main class of a process that publishes each name it is told, with its own name as the content, and prints the outcome. */
final class RacingProcess {
    private RacingProcess() {}

    public static void main(String[] arguments) throws IOException {
        Store store = new LocalStore(Path.of(arguments[0]));
        BufferedReader in = new BufferedReader(new InputStreamReader(System.in, StandardCharsets.UTF_8));
        for (String name = in.readLine(); name != null; name = in.readLine()) {
            System.out.println(store.publish(name, StoreContract.bytes(arguments[1])));
        }
    }
}
