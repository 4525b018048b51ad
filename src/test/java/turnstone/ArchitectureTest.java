package turnstone;

import static com.tngtech.archunit.base.DescribedPredicate.not;
import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideInAPackage;
import static com.tngtech.archunit.core.domain.JavaClass.Predicates.resideInAnyPackage;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.classes;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.methods;
import static com.tngtech.archunit.lang.syntax.ArchRuleDefinition.noClasses;
import static com.tngtech.archunit.library.dependencies.SlicesRuleDefinition.slices;
import static java.util.stream.Collectors.toSet;
import static org.assertj.core.api.Assertions.assertThat;

import com.tngtech.archunit.base.DescribedPredicate;
import com.tngtech.archunit.core.domain.JavaClass;
import com.tngtech.archunit.core.domain.JavaClasses;
import com.tngtech.archunit.core.domain.JavaField;
import com.tngtech.archunit.core.domain.JavaMethod;
import com.tngtech.archunit.core.domain.JavaModifier;
import com.tngtech.archunit.core.importer.ClassFileImporter;
import com.tngtech.archunit.lang.ArchCondition;
import com.tngtech.archunit.lang.ArchRule;
import com.tngtech.archunit.lang.ConditionEvents;
import com.tngtech.archunit.lang.SimpleConditionEvent;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import java.util.Map;
import java.util.Set;
import java.util.stream.Stream;
import org.junit.jupiter.api.DynamicTest;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.TestFactory;

/** Holds the arrows between packages and the rules of the house that a compiler doesn't know. */
class ArchitectureTest {
    private static final Path BASE = Path.of(System.getProperty("turnstone.basedir"));
    private static final Path MAIN = BASE.resolve("src/main/java");
    private static final int LONGEST_FILE = 300;

    /** Who may use whom; {@code fault} and {@code json} are for anybody. The table in DEVELOPERS.md says the same. */
    private static final Map<String, Set<String>> ARROWS = Map.ofEntries(
            Map.entry("fault", Set.of()),
            Map.entry("json", Set.of("fault")),
            Map.entry("measure", Set.of()),
            Map.entry("moments", Set.of()),
            Map.entry("store", Set.of()),
            Map.entry("fisher", Set.of("moments", "measure")),
            Map.entry("decide", Set.of("fisher", "measure")),
            Map.entry("ledger", Set.of("moments", "measure", "store")),
            Map.entry("shelf", Set.of("decide", "store")),
            Map.entry("audit", Set.of("store")),
            Map.entry("plant", Set.of("measure")),
            Map.entry("refit", Set.of("fisher", "decide", "ledger", "plant", "moments", "measure", "shelf")),
            Map.entry("trial", Set.of("refit", "decide", "plant", "measure", "moments")),
            Map.entry("sample", Set.of("measure", "plant")),
            Map.entry(
                    "spark",
                    Set.of(
                            "measure", "moments", "store", "fisher", "decide", "ledger", "shelf", "plant", "refit",
                            "trial", "sample")),
            Map.entry("table", Set.of("measure", "moments", "fisher", "decide", "spark")),
            Map.entry(
                    "night",
                    Set.of(
                            "measure", "moments", "store", "fisher", "decide", "ledger", "shelf", "plant", "refit",
                            "trial", "sample", "spark", "table", "audit")),
            Map.entry(
                    "cli",
                    Set.of(
                            "measure", "moments", "store", "fisher", "decide", "ledger", "shelf", "plant", "refit",
                            "trial", "sample", "spark", "table", "audit", "night")));

    private static final Set<String> ON_THE_ENGINE = Set.of("spark", "night", "cli");

    private static final JavaClasses PROGRAM = new ClassFileImporter().importPath(BASE.resolve("target/classes"));

    private static Stream<Path> sources() {
        try (Stream<Path> files = Files.walk(MAIN)) {
            return files.filter(file -> file.toString().endsWith(".java")).toList().stream();
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }

    private static Set<String> packagesInUse() {
        return sources()
                .map(file ->
                        MAIN.resolve("turnstone").relativize(file.getParent()).toString())
                .collect(toSet());
    }

    @Test
    void everyPackageHasItsArrows() {
        assertThat(ARROWS.keySet()).containsAll(packagesInUse());
        assertThat(PROGRAM).hasSizeGreaterThan(5);
    }

    @TestFactory
    Stream<DynamicTest> aPackageUsesOnlyThoseItMay() {
        return packagesInUse().stream()
                .sorted()
                .map(name -> DynamicTest.dynamicTest(name, () -> arrowsOf(name).check(PROGRAM)));
    }

    private static ArchRule arrowsOf(String name) {
        String[] allowed = Stream.concat(Stream.of(name, "fault", "json"), ARROWS.getOrDefault(name, Set.of()).stream())
                .map(ArchitectureTest::inProgram)
                .toArray(String[]::new);
        DescribedPredicate<JavaClass> others = resideInAPackage("turnstone..").and(not(resideInAnyPackage(allowed)));
        return noClasses()
                .that()
                .resideInAPackage(inProgram(name))
                .should()
                .dependOnClassesThat(others)
                .because("of the arrows in DEVELOPERS.md");
    }

    private static String inProgram(String name) {
        return "turnstone." + name + "..";
    }

    @Test
    void packagesFormNoCycle() {
        slices().matching("turnstone.(*)..").should().beFreeOfCycles().check(PROGRAM);
    }

    @Test
    void onlyThreePackagesKnowTheEngine() {
        noClasses()
                .that()
                .resideOutsideOfPackages(
                        ON_THE_ENGINE.stream().map(ArchitectureTest::inProgram).toArray(String[]::new))
                .should()
                .dependOnClassesThat()
                .resideInAnyPackage("org.apache.spark..", "org.apache.hadoop..", "scala..", "org.apache.parquet..")
                .check(PROGRAM);
    }

    @Test
    void theIncubatorModuleStaysInTheVectorKernel() {
        noClasses()
                .that()
                .haveNameNotMatching("turnstone\\.moments\\.Vector.*")
                .should()
                .dependOnClassesThat()
                .resideInAPackage("jdk.incubator..")
                .orShould()
                .dependOnClassesThat()
                .haveNameMatching("turnstone\\.moments\\.Vector.*")
                .check(PROGRAM);
    }

    @Test
    void everyPackageSaysWhatItOwns() {
        assertThat(packagesInUse())
                .allSatisfy(name -> assertThat(
                                MAIN.resolve("turnstone").resolve(name).resolve("package-info.java"))
                        .content()
                        .contains("/**", "package turnstone." + name + ";"));
    }

    @Test
    void onlyTheCommandLineTalksAndEndsTheProcess() {
        ArchRule rule = noClasses()
                .that()
                .resideOutsideOfPackage("turnstone.cli..")
                .should()
                .accessField(System.class, "out")
                .orShould()
                .accessField(System.class, "err")
                .orShould()
                .callMethod(System.class, "exit", int.class)
                .orShould()
                .callMethod(Runtime.class, "halt", int.class);
        rule.check(PROGRAM);
    }

    @Test
    void nobodyPrintsAStackTraceToTheTerminal() {
        noClasses()
                .should()
                .callMethodWhere(DescribedPredicate.describe(
                        "is printStackTrace()",
                        call -> call.getTarget().getName().equals("printStackTrace")
                                && call.getTarget().getRawParameterTypes().isEmpty()))
                .check(PROGRAM);
    }

    @Test
    void nothingStaticChanges() {
        classes()
                .should(new ArchCondition<JavaClass>("have no static field that changes") {
                    @Override
                    public void check(JavaClass item, ConditionEvents events) {
                        for (JavaField field : item.getFields()) {
                            boolean changes = field.getModifiers().contains(JavaModifier.STATIC)
                                    && !field.getModifiers().contains(JavaModifier.FINAL)
                                    && !field.getModifiers().contains(JavaModifier.SYNTHETIC);
                            events.add(new SimpleConditionEvent(field, !changes, field.getDescription() + " changes"));
                        }
                    }
                })
                .check(PROGRAM);
    }

    @Test
    void namesCarryNoGet() {
        methods()
                .that()
                .arePublic()
                .and()
                .haveNameMatching("get[A-Z].*")
                .should(new ArchCondition<JavaMethod>("implement a method of a library") {
                    @Override
                    public void check(JavaMethod item, ConditionEvents events) {
                        boolean inherited = Stream.concat(
                                        item.getOwner().getAllRawSuperclasses().stream(),
                                        item.getOwner().getAllRawInterfaces().stream())
                                .anyMatch(above -> !above.getPackageName().startsWith("turnstone")
                                        && above.getMethods().stream()
                                                .anyMatch(
                                                        other -> other.getName().equals(item.getName())));
                        events.add(new SimpleConditionEvent(item, inherited, item.getDescription() + " is called get"));
                    }
                })
                .allowEmptyShould(true)
                .check(PROGRAM);
    }

    @Test
    void namesSayWhatAThingIs() {
        noClasses()
                .should()
                .haveNameMatching(".*(Util|Utils|Helper|Manager|Impl)")
                .check(PROGRAM);
    }

    @Test
    void filesStayShort() {
        List<String> tooLong = sources()
                .map(file -> MAIN.relativize(file) + " has " + lines(file) + " lines")
                .filter(text -> Integer.parseInt(text.replaceAll(".* has (\\d+) lines", "$1")) > LONGEST_FILE)
                .toList();
        assertThat(tooLong).isEmpty();
    }

    private static int lines(Path file) {
        try {
            return Files.readAllLines(file).size();
        } catch (IOException failure) {
            throw new UncheckedIOException(failure);
        }
    }
}
