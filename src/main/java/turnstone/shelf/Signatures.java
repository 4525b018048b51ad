package turnstone.shelf;

import java.util.List;

/** The signatures that a journal holds. */
final class Signatures {
    private Signatures() {}

    /** All that a model was given, in order; whether they hold is not looked at. */
    static List<ModelSignature> of(List<ShelfEntry> history, String model) {
        return history.stream()
                .filter(entry -> entry.to().equals(model))
                .flatMap(entry -> entry.signature().stream())
                .toList();
    }
}
