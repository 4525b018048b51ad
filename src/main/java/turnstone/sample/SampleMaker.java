package turnstone.sample;

import java.util.List;

/**
 * Makes the records of many showings, and keeps what the showings of one sorter and night have in common: quick where they come sorter by
 * sorter. The records are those of {@link SamplePlant#records}. Not for sharing between threads.
 */
public final class SampleMaker {
    private final long seed;
    private final SampleSize size;
    private final Light light;
    private int sorter = -1;
    private int night = -1;
    private Optics optics;

    SampleMaker(long seed, SampleSize size, Light light) {
        this.seed = seed;
        this.size = size;
        this.light = light;
    }

    /** The records of a showing. */
    public List<SampleRecord> records(SampleShowing showing) {
        SampleShowing.Place place = showing.place();
        if (place.sorter() != sorter || place.night() != night) {
            optics = new Optics(light.night(place.sorter(), place.night()));
            sorter = place.sorter();
            night = place.night();
        }
        boolean stray = showing.sorter().equals(Traps.UNKNOWN_SORTER);
        return new Scene(seed, showing, stray ? 1 : size.recordsPerShowing(), optics).records();
    }
}
