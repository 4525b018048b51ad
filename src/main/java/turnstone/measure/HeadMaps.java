package turnstone.measure;

import java.io.Serializable;
import java.util.List;

/** The sparse linear maps of an instrument: one for all belt columns, and one for each band of columns that has a wavelength table of its own. */
final class HeadMaps implements Serializable {
    private final ResampleMap main;
    private final Instrument.Band[] bands;
    private final ResampleMap[] bandMaps;

    private HeadMaps(ResampleMap main, Instrument.Band[] bands, ResampleMap[] bandMaps) {
        this.main = main;
        this.bands = bands;
        this.bandMaps = bandMaps;
    }

    static HeadMaps of(HeadSpec spec, Instrument instrument) {
        int[] kept = spec.kept();
        if (spec.resampling() == Resampling.NONE) {
            checkUnresampled(spec, instrument, kept);
            return new HeadMaps(ResampleMap.selection(kept), new Instrument.Band[0], new ResampleMap[0]);
        }
        if (instrument == null || !instrument.hasWavelengths()) {
            throw HeadSpecChecks.refusal("resampling needs the instrument's wavelength table")
                    .found(instrument == null ? "no instrument" : instrument.name() + " without one")
                    .remedy("give each instrument its wavelengths, or leave resampling out");
        }
        double[] axis = spec.axis_nm();
        String place = "instrument " + instrument.name();
        ResampleMap main = ResampleMap.linear(instrument.wavelength_nm(), instrument.deadChannels(), axis, kept, place);
        List<Instrument.Band> bands = instrument.bands();
        ResampleMap[] bandMaps = new ResampleMap[bands.size()];
        for (int b = 0; b < bandMaps.length; b++) {
            bandMaps[b] = ResampleMap.linear(
                    bands.get(b).wavelength_nm(), instrument.deadChannels(), axis, kept, place + " band " + (b + 1));
        }
        return new HeadMaps(main, bands.toArray(new Instrument.Band[0]), bandMaps);
    }

    private static void checkUnresampled(HeadSpec spec, Instrument instrument, int[] kept) {
        if (instrument == null) {
            return;
        }
        if (instrument.channels() != spec.channels()) {
            throw HeadSpecChecks.refusal("the instrument has another number of channels than the head")
                    .found(instrument.name() + " with " + instrument.channels())
                    .expected(spec.channels())
                    .remedy("resample to the plant's axis, or correct the number of channels");
        }
        for (int channel : kept) {
            if (instrument.deadChannels().contains(channel)) {
                throw HeadSpecChecks.refusal("a channel known to be dead is neither masked nor bridged by resampling")
                        .found(instrument.name() + " channel " + (channel + 1))
                        .remedy("mask it, or resample");
            }
        }
    }

    ResampleMap main() {
        return main;
    }

    ResampleMap of(int beltColumn) {
        for (int b = 0; b < bands.length; b++) {
            if (bands[b].holds(beltColumn)) {
                return bandMaps[b];
            }
        }
        return main;
    }
}
