package turnstone.store;

class MemoryStoreTest extends StoreContract {
    private final MemoryStore store = new MemoryStore();

    @Override
    Store store() {
        return store;
    }
}
