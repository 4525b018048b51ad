package turnstone.cli;

import picocli.CommandLine.IVersionProvider;

/** The version, as the jar's manifest says. */
final class Version implements IVersionProvider {
    @Override
    public String[] getVersion() {
        String version = Version.class.getPackage().getImplementationVersion();
        return new String[] {
            "turnstone " + (version == null ? "(not packed)" : version),
            "Java " + System.getProperty("java.version") + ", " + System.getProperty("java.vendor")
        };
    }
}
