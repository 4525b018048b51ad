package turnstone.store;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.IOException;
import java.io.InputStream;
import java.io.UncheckedIOException;
import java.util.NavigableMap;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.concurrent.ConcurrentSkipListMap;
import turnstone.fault.Fault;
import turnstone.json.Json;

/** A store in memory, for tests of what is built on stores. Its files can be damaged on purpose. */
public class MemoryStore implements Store {
    private final ConcurrentSkipListMap<String, byte[]> files = new ConcurrentSkipListMap<>();

    /** The files, to be looked at and damaged. */
    public NavigableMap<String, byte[]> files() {
        return files;
    }

    @Override
    public Optional<byte[]> read(String name) {
        return Optional.ofNullable(files.get(Names.check(name))).map(byte[]::clone);
    }

    @Override
    public InputStream open(String name) {
        return new ByteArrayInputStream(read(name)
                .orElseThrow(
                        () -> Fault.storage("can't be read").at(place(name)).found("no such file")));
    }

    @Override
    public OptionalLong size(String name) {
        byte[] content = files.get(Names.check(name));
        return content == null ? OptionalLong.empty() : OptionalLong.of(content.length);
    }

    @Override
    public Outcome publish(String name, byte[] content) {
        return files.putIfAbsent(Names.check(name), content.clone()) == null ? Outcome.PUBLISHED : Outcome.LOST;
    }

    @Override
    public Written write(String name, ContentWriter content) {
        ByteArrayOutputStream out = new ByteArrayOutputStream();
        try {
            content.writeTo(out);
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        byte[] bytes = out.toByteArray();
        if (publish(name, bytes) == Outcome.LOST) {
            throw Fault.storage("there is a file already where a new one was to be written")
                    .at(place(name));
        }
        return new Written(name, bytes.length, Json.sha256(bytes));
    }

    @Override
    public void discard(String name) {
        files.remove(Names.check(name));
    }

    @Override
    public String describe() {
        return "memory";
    }
}
