package turnstone.night;

import org.junit.jupiter.api.extension.ExtensionContext;
import org.junit.jupiter.api.extension.ParameterContext;
import org.junit.jupiter.api.extension.ParameterResolver;
import turnstone.sample.SampleSize;
import turnstone.spark.SharedSession;

/** One small plant of each size for all tests of a run, removed at its end; {@code -Dturnstone.seed} tries other ones. */
final class SharedPlant implements ParameterResolver {
    private static final ExtensionContext.Namespace OURS = ExtensionContext.Namespace.create(SharedPlant.class);
    private static final long SEED = Long.getLong("turnstone.seed", 20_260_301);

    @Override
    public boolean supportsParameter(ParameterContext parameter, ExtensionContext context) {
        return parameter.getParameter().getType() == SmallPlant.class;
    }

    @Override
    public Object resolveParameter(ParameterContext parameter, ExtensionContext context) {
        SampleSize size = parameter.isAnnotated(Coarse.class) ? SmallPlant.COARSE : SmallPlant.FINE;
        return context.getRoot()
                .getStore(OURS)
                .getOrComputeIfAbsent(
                        size, wanted -> SmallPlant.write(SharedSession.of(context), wanted, SEED), SmallPlant.class);
    }
}
