package turnstone.shelf;

import java.nio.file.Path;
import java.util.Optional;
import turnstone.store.HaltingDisk;

/** A process that releases a model and is killed on the way. Arguments: folder, step, model. */
final class KilledRelease {
    private KilledRelease() {}

    public static void main(String[] arguments) {
        Shelf shelf = Shelf.open(
                HaltingDisk.store(Path.of(arguments[0]), Integer.parseInt(arguments[1])),
                new Shelves.Hands(),
                Shelves.READER);
        shelf.release(arguments[2], Optional.empty(), "second", "x");
    }
}
