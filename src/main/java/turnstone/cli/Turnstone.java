package turnstone.cli;

import picocli.CommandLine.Command;
import picocli.CommandLine.Mixin;
import picocli.CommandLine.Model.CommandSpec;
import picocli.CommandLine.Option;
import picocli.CommandLine.ParameterException;
import picocli.CommandLine.Spec;

/** The program without a command: says which there are. */
@Command(
        name = "turnstone",
        versionProvider = Version.class,
        description = {"Discriminant projections for fleets of near-infrared sorters, from exact sums.", ""},
        footer = {
            "",
            "First steps: turnstone nightly --sample     the whole night on an invented plant",
            "             turnstone COMMAND --help       what a command takes, with an example",
            "",
            "Exit codes: 0 done, released or held; 2 command line or plant file; 3 input refused; 4 storage or",
            "cluster; 5 somebody else was first; 70 a defect; 130 interrupted."
        })
final class Turnstone implements Runnable {
    @Mixin
    CommonOptions common;

    @Option(
            names = {"-V", "--version"},
            versionHelp = true,
            description = "print the version")
    boolean version;

    @Spec
    CommandSpec spec;

    @Override
    public void run() {
        throw new ParameterException(spec.commandLine(), "no command is given");
    }
}
