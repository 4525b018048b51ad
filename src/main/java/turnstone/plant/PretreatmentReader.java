package turnstone.plant;

import java.io.IOException;
import java.math.BigDecimal;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.Locale;
import java.util.Optional;
import turnstone.json.Json;
import turnstone.measure.ChannelScale;
import turnstone.measure.CountScale;
import turnstone.measure.Head;
import turnstone.measure.HeadSpec;
import turnstone.measure.HeadSpecBuilder;
import turnstone.measure.InputKind;
import turnstone.measure.Instrument;
import turnstone.measure.Precision;
import turnstone.measure.Resampling;
import turnstone.measure.TailSpec;

/** Reads the pretreatment and the count scale. */
final class PretreatmentReader {
    private static final double USUAL_SPREAD_FLOOR = 0.001;

    private PretreatmentReader() {}

    static HeadSpec head(
            Entry root,
            double[] axis_nm,
            int channels,
            List<Instrument> instruments,
            Optional<ReferenceSpec> references) {
        Entry pretreatment = root.at("pretreatment");
        HeadSpecBuilder builder = HeadSpec.builder(channels)
                .input(InputKind.valueOf(pretreatment.at("input").text().toUpperCase(Locale.ROOT)));
        Optional<Entry> head = pretreatment.optional("head");
        Resampling resampling = resampling(pretreatment, head, axis_nm, instruments);
        if (resampling == Resampling.NONE) {
            checkSameChannels(root, channels, instruments);
        }
        if (axis_nm.length > 0) {
            builder.axis(axis_nm, resampling);
        }
        references.ifPresent(table -> builder.correct(table.maxAge_ms()));
        head.ifPresent(entry -> steps(entry, builder));
        HeadSpec spec = head.orElse(pretreatment).checked(builder::build);
        if (resampling == Resampling.FROM_INSTRUMENT) {
            checkRange(root, spec, head, instruments);
        }
        return spec;
    }

    /** The axis, less its mask, must lie within each instrument's wavelengths. */
    private static void checkRange(Entry root, HeadSpec spec, Optional<Entry> head, List<Instrument> instruments) {
        HeadSpecBuilder resampler = HeadSpec.builder(spec.channels()).axis(spec.axis_nm(), Resampling.FROM_INSTRUMENT);
        head.ifPresent(entry -> mask(entry, resampler));
        HeadSpec resampling = resampler.build();
        List<Entry> entries = root.at("instruments").items();
        for (int i = 0; i < entries.size(); i++) {
            Instrument instrument = instruments.get(i);
            entries.get(i).checked(() -> Head.of(resampling, instrument, null));
        }
    }

    private static Resampling resampling(
            Entry pretreatment, Optional<Entry> head, double[] axis_nm, List<Instrument> instruments) {
        boolean tables = instruments.stream().allMatch(Instrument::hasWavelengths);
        if (!head.flatMap(entry -> entry.on("resample")).orElse(axis_nm.length > 0 && tables)) {
            return Resampling.NONE;
        }
        if (axis_nm.length == 0 || !tables) {
            throw head.flatMap(entry -> entry.optional("resample"))
                    .orElse(pretreatment)
                    .fault("resampling needs an axis and the wavelengths of every instrument")
                    .found(axis_nm.length == 0 ? "no axis" : "an instrument without wavelengths");
        }
        return Resampling.FROM_INSTRUMENT;
    }

    private static void checkSameChannels(Entry root, int channels, List<Instrument> instruments) {
        for (Instrument instrument : instruments) {
            if (instrument.channels() != channels) {
                throw root.at("instruments")
                        .fault("without resampling every instrument has the channels of the plant")
                        .found(instrument.channels() + " on " + instrument.name())
                        .expected(channels);
            }
        }
    }

    private static void steps(Entry head, HeadSpecBuilder builder) {
        head.optional("saturatedAt").ifPresent(value -> builder.saturatedAt(value.number()));
        head.optional("deadAtOrBelow").ifPresent(value -> builder.deadAtOrBelow(value.number()));
        head.optional("floor").ifPresent(value -> builder.floor(value.number()));
        head.optional("noSignalBelow").ifPresent(value -> builder.noSignalBelow(value.number()));
        if (head.on("log").orElse(false)) {
            builder.absorbance();
        }
        mask(head, builder);
        if (head.on("snv").orElse(false)) {
            builder.snv(head.number("snvSpreadFloor", USUAL_SPREAD_FLOOR));
        } else if (head.has("snvSpreadFloor")) {
            throw head.at("snvSpreadFloor").fault("a spread floor without SNV").expected("snv: on");
        }
    }

    private static void mask(Entry head, HeadSpecBuilder builder) {
        for (Entry range : head.optional("mask").map(Entry::items).orElse(List.of())) {
            if (byWavelength(range)) {
                builder.dropWavelengths(
                        range.at("from_nm").number(), range.at("to_nm").number());
            } else {
                builder.dropChannels(
                        range.at("fromChannel").whole() - 1,
                        range.at("toChannel").whole() - 1);
            }
        }
    }

    private static boolean byWavelength(Entry range) {
        boolean wavelengths = range.has("from_nm") || range.has("to_nm");
        boolean channels = range.has("fromChannel") || range.has("toChannel");
        if (wavelengths == channels) {
            throw range.fault("a masked range is given by wavelengths or by channels")
                    .expected("from_nm and to_nm, or fromChannel and toChannel");
        }
        return wavelengths;
    }

    static TailSpec tail(Entry root, int channels) {
        List<TailSpec.Step> steps = new ArrayList<>();
        Optional<Entry> list = root.at("pretreatment").optional("tail");
        for (Entry entry : list.map(Entry::items).orElse(List.of())) {
            steps.add(entry.checked(() -> step(entry)));
            // Here, not after the last: the step that does not fit is the one to name.
            entry.checked(() -> new TailSpec(steps).outputs(channels));
        }
        return new TailSpec(steps);
    }

    private static TailSpec.Step step(Entry entry) {
        String kind = entry.keys().get(0);
        Entry numbers = entry.at(kind);
        return switch (kind) {
            case "savitzkyGolay" ->
                new TailSpec.SavitzkyGolay(
                        numbers.at("window").whole(),
                        numbers.at("order").whole(),
                        numbers.at("derivative").whole());
            case "bins" -> new TailSpec.Bins(numbers.at("width").whole());
            default ->
                new TailSpec.Mask(
                        numbers.at("fromChannel").whole() - 1,
                        numbers.at("toChannel").whole() - 1);
        };
    }

    static CountScale countScale(Entry root, Path folder, int channels) {
        Entry entry = root.at("countScale");
        CountScale scale = switch (entry.oneOf("step", "channels", "file")) {
            case "step" -> entry.checked(() -> uniform(entry, channels));
            case "channels" -> entry.checked(() -> listed(entry.at("channels")));
            default -> file(entry.at("file"), folder);
        };
        if (scale.channels() != channels) {
            throw entry.fault("the count scale has another number of channels than the pretreatment head puts out")
                    .found(scale.channels())
                    .expected(channels);
        }
        return scale;
    }

    private static CountScale uniform(Entry entry, int channels) {
        ChannelScale one = channelScale(entry);
        return CountScale.uniform(channels, one.offset(), one.step(), one.precision());
    }

    private static CountScale listed(Entry list) {
        List<ChannelScale> scales = new ArrayList<>();
        list.items().forEach(item -> scales.add(item.checked(() -> channelScale(item))));
        return CountScale.of(scales);
    }

    private static ChannelScale channelScale(Entry entry) {
        BigDecimal offset = entry.optional("offset").map(Entry::decimal).orElse(BigDecimal.ZERO);
        Precision precision = entry.text("precision", "coarse").equals("fine") ? Precision.FINE : Precision.COARSE;
        return new ChannelScale(offset, entry.at("step").decimal(), precision);
    }

    private static CountScale file(Entry entry, Path folder) {
        Path file = folder.resolve(entry.text());
        try {
            return CountScale.fromJson(Json.read(Files.readAllBytes(file), file.toString()));
        } catch (IOException e) {
            throw entry.fault("the count scale can't be read")
                    .found(file + " (" + e.getClass().getSimpleName() + ")")
                    .because(e);
        }
    }
}
