package turnstone.plant;

import java.util.Optional;
import java.util.OptionalDouble;

/**
 * One material of the plant.
 *
 * @param name as it stands in the records
 * @param grams_per_cm2 mass by area, above 0; turns a share by mass into one by records
 * @param note for readers of the plant file
 */
public record Material(String name, OptionalDouble grams_per_cm2, Optional<String> note) {}
