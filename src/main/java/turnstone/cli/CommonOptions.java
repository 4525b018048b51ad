package turnstone.cli;

import picocli.CommandLine.Option;

/** Options that every command has. */
final class CommonOptions {
    @Option(names = "--json", description = "print the result as JSON")
    boolean json;

    @Option(names = "--trace", description = "after a refusal or failure, also print where it was raised")
    boolean trace;

    @Option(
            names = {"-h", "--help"},
            usageHelp = true,
            description = "print this text")
    boolean help;
}
