package turnstone.cli;

import picocli.CommandLine;

/** All commands, in the order of the help text. */
final class Commands {
    private Commands() {}

    static CommandLine line(Console console) {
        CommandLine line = new CommandLine(new Turnstone())
                .addSubcommand(new NightlyCommand(console))
                .addSubcommand(new ScaleCommand(console))
                .addSubcommand(new PostCommand(console))
                .addSubcommand(new RefitCommand(console))
                .addSubcommand(new TrialCommand(console))
                .addSubcommand(new ReleaseCommand(console))
                .addSubcommand(new RevertCommand(console))
                .addSubcommand(new WithdrawCommand(console))
                .addSubcommand(new HistoryCommand(console))
                .addSubcommand(new ShowCommand(console))
                .addSubcommand(new VerifyCommand(console))
                .addSubcommand(new KeyCommand(console))
                .addSubcommand(AuditCommand.line(console))
                .addSubcommand(new FitCommand(console))
                .addSubcommand(new ProjectCommand(console))
                .addSubcommand(new SampleCommand(console));
        endWithNewline(line);
        line.getSubcommands().values().forEach(Commands::endWithNewline);
        return line;
    }

    /** The help text ends where its footer does, without a newline. */
    private static void endWithNewline(CommandLine line) {
        String[] footer = line.getCommandSpec().usageMessage().footer();
        footer[footer.length - 1] += "%n";
        line.getCommandSpec().usageMessage().footer(footer);
    }
}
