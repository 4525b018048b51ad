package turnstone.cli;

import java.time.LocalDate;
import java.util.Map;
import org.junit.jupiter.api.extension.ExtensionContext;
import org.junit.jupiter.api.extension.ParameterContext;
import org.junit.jupiter.api.extension.ParameterResolver;
import turnstone.sample.SamplePlant;
import turnstone.sample.SampleSize;
import turnstone.spark.SampleJob;
import turnstone.spark.Session;

/**
 * One small invented plant of two nights for all tests of the command line, the first night posted and a model of it in service. It is
 * only to be copied. The engine stays up for them all.
 */
final class SmallPlants implements ParameterResolver {
    static final LocalDate FIRST = LocalDate.of(2026, 3, 2);
    static final LocalDate LAST = LocalDate.of(2026, 3, 3);

    private static final ExtensionContext.Namespace OURS = ExtensionContext.Namespace.create(SmallPlants.class);

    private record Held(Session session, PlantOnDisk plant) implements AutoCloseable {
        @Override
        public void close() {
            session.close();
            plant.removeAll();
        }
    }

    @Override
    public boolean supportsParameter(ParameterContext parameter, ExtensionContext context) {
        return parameter.getParameter().getType() == PlantOnDisk.class;
    }

    @Override
    public Object resolveParameter(ParameterContext parameter, ExtensionContext context) {
        return context.getRoot()
                .getStore(OURS)
                .getOrComputeIfAbsent(PlantOnDisk.class, key -> made(), Held.class)
                .plant();
    }

    private static Held made() {
        Session session = Session.open(new Session.Settings("tests", "local[2,4]", Map.of()));
        PlantOnDisk plant = PlantOnDisk.temporary();
        SampleJob.write(session, SamplePlant.of(new SampleSize(2, 2, 4, 6, 24), 20_260_301), plant.folder());
        plant.run("post", "--day", FIRST.toString()).succeeds();
        String model = plant.run("refit", "--json")
                .succeeds()
                .out()
                .replaceAll("(?s).*\"fingerprint\" *: *\"([0-9a-f]{64})\".*", "$1");
        Ran.command("release", model, "--plant", plant.file(), "--reason", "first coefficients")
                .succeeds();
        return new Held(session, plant);
    }
}
