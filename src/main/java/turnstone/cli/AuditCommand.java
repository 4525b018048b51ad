package turnstone.cli;

import picocli.CommandLine;
import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** {@code audit}: what bales and hand sorts were found to hold. */
@Command(
        name = "audit",
        description =
                "Enters and lists what bales and hand sorts were found to hold; later verdicts set it against what was predicted.",
        footer = {"", "Example: turnstone audit add --help"})
final class AuditCommand implements Runnable {
    @Mixin
    CommonOptions common;

    @Spec
    CommandSpec spec;

    static CommandLine line(Console console) {
        return new CommandLine(new AuditCommand())
                .addSubcommand(new AuditAddCommand(console))
                .addSubcommand(new AuditListCommand(console));
    }

    @Override
    public void run() {
        throw new ParameterException(spec.commandLine(), "say what: audit add or audit list");
    }
}
