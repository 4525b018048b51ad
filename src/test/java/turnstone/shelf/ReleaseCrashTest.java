package turnstone.shelf;

import static org.assertj.core.api.Assertions.assertThat;
import static turnstone.shelf.Shelves.READER;
import static turnstone.shelf.Shelves.model;

import java.io.InputStream;
import java.util.Optional;
import java.util.OptionalLong;
import java.util.Set;
import java.util.TreeMap;
import java.util.function.Consumer;
import java.util.function.Supplier;
import org.junit.jupiter.api.Test;
import turnstone.store.ContentWriter;
import turnstone.store.MemoryStore;
import turnstone.store.Outcome;
import turnstone.store.Store;
import turnstone.store.Written;

/** A crash at any step of a change leaves what was in service, or what was to be. */
class ReleaseCrashTest {
    /** Stops everything, as if the machine had gone: at its {@code step}-th use, before it has done anything or after. */
    private static final class CrashingStore implements Store {
        private enum When {
            BEFORE,
            AFTER
        }

        private static final class Crash extends Error {
            private static final long serialVersionUID = 1L;
        }

        private final Store store;
        private final int step;
        private final When when;
        private int uses;

        CrashingStore(Store store, int step, When when) {
            this.store = store;
            this.step = step;
            this.when = when;
        }

        private <T> T use(Supplier<T> what) {
            uses++;
            if (uses == step && when == When.BEFORE) {
                throw new Crash();
            }
            T result = what.get();
            if (uses == step) {
                throw new Crash();
            }
            return result;
        }

        @Override
        public Optional<byte[]> read(String name) {
            return use(() -> store.read(name));
        }

        @Override
        public InputStream open(String name) {
            return use(() -> store.open(name));
        }

        @Override
        public OptionalLong size(String name) {
            return use(() -> store.size(name));
        }

        @Override
        public Outcome publish(String name, byte[] content) {
            return use(() -> store.publish(name, content));
        }

        @Override
        public Written write(String name, ContentWriter content) {
            return use(() -> store.write(name, content));
        }

        @Override
        public void discard(String name) {
            store.discard(name);
        }

        @Override
        public String describe() {
            return store.describe();
        }
    }

    private static Shelf open(Store store) {
        return Shelf.open(store, new Shelves.Hands(), READER);
    }

    private static Service service(String fleet, String avocet) {
        TreeMap<String, String> sorters = new TreeMap<>();
        sorters.put("avocet", avocet);
        return new Service(fleet, sorters);
    }

    /** Tries the change again and again, the crash one step later each time, until it gets through. */
    private static int crashes(Consumer<Shelf> prepare, Consumer<Shelf> change, Service before, Service after) {
        int crashes = 0;
        for (CrashingStore.When when : CrashingStore.When.values()) {
            for (int step = 1; ; step++) {
                MemoryStore disk = new MemoryStore();
                prepare.accept(open(disk));
                assertThat(open(disk).running()).contains(before);
                boolean crashed = false;
                try {
                    change.accept(open(new CrashingStore(disk, step, when)));
                } catch (CrashingStore.Crash crash) {
                    crashed = true;
                    crashes++;
                }
                Shelf found = open(disk);
                assertThat(found.verify()).as("step %s %s", step, when).isEmpty();
                if (!crashed) {
                    assertThat(found.running()).contains(after);
                    break;
                }
                assertThat(found.running().orElseThrow())
                        .as("step %s %s", step, when)
                        .isIn(before, after);
                // And it can be told and gone on from.
                if (found.running().orElseThrow().equals(before)) {
                    change.accept(found);
                }
                assertThat(open(disk).running()).contains(after);
            }
        }
        return crashes;
    }

    private static final String A = model(1).path("fingerprint").asText();
    private static final String B = model(2).path("fingerprint").asText();

    private static void putBoth(Shelf shelf) {
        shelf.put(model(1));
        shelf.put(model(2));
        shelf.release(A, Optional.empty(), "first", "x");
    }

    @Test
    void aReleaseLeavesOldOrNew() {
        int crashes = crashes(
                ReleaseCrashTest::putBoth,
                shelf -> shelf.release(B, Optional.empty(), "second", "x"),
                Service.whole(A),
                Service.whole(B));
        assertThat(crashes).isGreaterThan(10);
    }

    @Test
    void aPutAndReleaseLeavesOldOrNew() {
        int crashes = crashes(
                shelf -> {
                    shelf.put(model(1));
                    shelf.release(A, Optional.empty(), "first", "x");
                },
                shelf -> {
                    shelf.put(model(2));
                    shelf.release(B, Optional.empty(), "second", "x");
                },
                Service.whole(A),
                Service.whole(B));
        assertThat(crashes).isGreaterThan(20);
    }

    @Test
    void aReleaseToOneSorterLeavesOldOrNew() {
        int crashes = crashes(
                ReleaseCrashTest::putBoth,
                shelf -> shelf.release(Release.of(B, "try", "x").withSorters(Set.of("avocet"))),
                Service.whole(A),
                service(A, B));
        assertThat(crashes).isGreaterThan(10);
    }

    @Test
    void aRevertAndAWithdrawalLeaveOldOrNew() {
        Consumer<Shelf> two = shelf -> {
            putBoth(shelf);
            shelf.release(B, Optional.empty(), "second", "x");
        };
        assertThat(crashes(two, shelf -> shelf.revert("no", "x"), Service.whole(B), Service.whole(A)))
                .isGreaterThan(8);
        assertThat(crashes(two, shelf -> shelf.withdraw(B, "no", "x"), Service.whole(B), Service.whole(A)))
                .isGreaterThan(8);
    }
}
