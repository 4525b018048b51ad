package turnstone.cli;

import java.time.Instant;
import java.time.LocalDate;
import java.time.ZoneOffset;
import java.time.format.DateTimeParseException;
import picocli.CommandLine.ITypeConverter;
import picocli.CommandLine.TypeConversionException;

/** Reads an instant, or a day as its last instant, in UTC. */
final class InstantOption implements ITypeConverter<Instant> {
    @Override
    public Instant convert(String text) {
        try {
            return text.length() > "2026-03-01".length()
                    ? Instant.parse(text)
                    : LocalDate.parse(text)
                            .plusDays(1)
                            .atStartOfDay()
                            .toInstant(ZoneOffset.UTC)
                            .minusMillis(1);
        } catch (DateTimeParseException e) {
            throw new TypeConversionException(
                    "\"" + text + "\" is no time; expected the form 2026-03-01 or 2026-03-01T06:00:00Z");
        }
    }
}
