package turnstone.cli;

import picocli.CommandLine.Option;

/** Who makes a change, and why. */
final class WhyOptions {
    @Option(names = "--reason", paramLabel = "TEXT", required = true, description = "why, for the journal")
    String reason;

    @Option(names = "--by", paramLabel = "NAME", description = "who, for the journal (default: the user's name)")
    String by = System.getProperty("user.name");
}
