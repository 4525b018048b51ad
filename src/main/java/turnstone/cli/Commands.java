package turnstone.cli;

import picocli.CommandLine;

/** All commands, in the order of the help text. */
final class Commands {
    private Commands() {}

    static CommandLine line(Console console) {
        return new CommandLine(new Turnstone())
                .addSubcommand(new NightlyCommand(console))
                .addSubcommand(new ScaleCommand(console))
                .addSubcommand(new PostCommand(console))
                .addSubcommand(new RefitCommand(console))
                .addSubcommand(new TrialCommand(console))
                .addSubcommand(new ReleaseCommand(console))
                .addSubcommand(new RevertCommand(console))
                .addSubcommand(new HistoryCommand(console))
                .addSubcommand(new ShowCommand(console))
                .addSubcommand(new VerifyCommand(console))
                .addSubcommand(new FitCommand(console))
                .addSubcommand(new ProjectCommand(console))
                .addSubcommand(new SampleCommand(console));
    }
}
