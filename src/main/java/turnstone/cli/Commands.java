package turnstone.cli;

import picocli.CommandLine;

/** All commands, in the order of the help text. */
final class Commands {
    private Commands() {}

    static CommandLine line(Console console) {
        return new CommandLine(new Turnstone())
                .addSubcommand(new ReleaseCommand(console))
                .addSubcommand(new RevertCommand(console))
                .addSubcommand(new HistoryCommand(console))
                .addSubcommand(new VerifyCommand(console));
    }
}
