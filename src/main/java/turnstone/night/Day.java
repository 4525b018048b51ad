package turnstone.night;

import java.time.LocalDate;
import java.util.Set;
import turnstone.measure.ReferenceTable;
import turnstone.plant.Plant;
import turnstone.spark.IntakeSpec;
import turnstone.spark.PlantTables;
import turnstone.spark.RecordSource;
import turnstone.spark.Session;

/**
 * One day's records, found and counted once, and how they are taken: shared by posting, trial and projection.
 *
 * @param day the day
 * @param source its files, counted apart from any job
 * @param intake keys, head, count scale
 */
public record Day(LocalDate day, RecordSource source, IntakeSpec intake) {
    /**
     * Finds a day's records and brings the references to the driver.
     *
     * @param without showings that are left out on purpose
     * @throws turnstone.fault.Fault of kind input or storage where files or references are not as the plant file says
     */
    public static Day open(Session session, Plant plant, LocalDate day, Set<String> without) {
        RecordSource source = RecordSource.open(session, PlantTables.records(plant, day));
        ReferenceTable references = PlantTables.references(session, plant);
        IntakeSpec intake = PlantTables.intake(plant, day, references);
        return new Day(day, source, without.isEmpty() ? intake : intake.without(without));
    }
}
