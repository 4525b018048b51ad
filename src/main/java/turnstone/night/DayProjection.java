package turnstone.night;

import java.time.LocalDate;
import java.util.Set;
import turnstone.decide.Model;
import turnstone.decide.Projector;
import turnstone.fault.Fault;
import turnstone.json.Json;
import turnstone.plant.Plant;
import turnstone.spark.ProjectJob;
import turnstone.spark.ProjectResult;
import turnstone.spark.ProjectSettings;
import turnstone.spark.Session;

/** Projects a day of a plant by a model of that plant. */
public final class DayProjection {
    private DayProjection() {}

    /**
     * Projects.
     *
     * @throws Fault of kind input where the model was made behind another head or on another count scale than the plant file's
     */
    public static ProjectResult run(
            Session session, Plant plant, LocalDate date, Set<String> without, Model model, ProjectSettings settings) {
        requireSameTerms(plant, model);
        Day day = Day.open(session, plant, date, without);
        return ProjectJob.run(day.source(), day.intake(), Projector.of(model), settings);
    }

    private static void requireSameTerms(Plant plant, Model model) {
        String head = Json.fingerprint(model.pretreatment().path("head"));
        boolean sameHead = plant.head().fingerprint().equals(head);
        boolean sameScale =
                plant.countScale().fingerprint().equals(model.countScale().fingerprint());
        if (!sameHead || !sameScale) {
            throw Fault.input("the model was made on other terms than the plant file's")
                    .at("model " + Words.shortened(model.fingerprint()))
                    .found(sameHead ? "another count scale" : "another pretreatment head")
                    .remedy("use the plant file that the model was made with");
        }
    }
}
