package turnstone.measure;

import turnstone.fault.Fault;

/** What makes a head senseless, each with its reason. */
final class HeadSpecChecks {
    /** SNV leaves n − 2 free numbers of n: with two channels every record becomes the same pair. */
    static final int LEAST_SNV_CHANNELS = 3;

    private HeadSpecChecks() {}

    static void numbers(HeadSpec spec) {
        if (spec.channels < 1) {
            throw refusal("a head needs at least one channel").found(spec.channels);
        }
        finite("saturatedAt", spec.saturatedAt);
        finite("deadAtOrBelow", spec.deadAtOrBelow);
        positive("floor", spec.floor);
        positive("noSignalBelow", spec.noSignalBelow);
        positive("snvSpreadFloor", spec.snvSpreadFloor);
        if (spec.maxWhiteAge_ms != null && (spec.maxWhiteAge_ms <= 0 || spec.maxDarkAge_ms <= 0)) {
            throw refusal("the largest age of a reference must be above 0 ms")
                    .found(Math.min(spec.maxWhiteAge_ms, spec.maxDarkAge_ms));
        }
        if (spec.axis_nm.length > 0) {
            Instrument.checkAscending(spec.axis_nm, "pretreatment axis");
        }
        for (HeadSpec.Drop drop : spec.mask) {
            boolean inRange = drop.byWavelength() || (drop.first() >= 0 && drop.last() < spec.channels);
            if (!(drop.first() <= drop.last()) || !inRange) {
                throw refusal("a masked range that is not one")
                        .found(range(drop))
                        .expected(drop.byWavelength() ? "from at or below to" : "channels 1 to " + spec.channels);
            }
        }
    }

    private static String range(HeadSpec.Drop drop) {
        return drop.byWavelength()
                ? DecimalText.shortest(drop.first()) + " to " + DecimalText.shortest(drop.last()) + " nm"
                : "channels " + (long) (drop.first() + 1) + " to " + (long) (drop.last() + 1);
    }

    static void combination(HeadSpec spec) {
        lightSteps(spec);
        countSteps(spec);
        if (spec.resampling == Resampling.FROM_INSTRUMENT && spec.axis_nm.length == 0) {
            throw refusal("resampling needs a wavelength axis to go to").remedy("give the plant's axis");
        }
        if (spec.axis_nm.length > 0 && spec.axis_nm.length != spec.channels) {
            throw refusal("the axis has another number of channels than the head")
                    .found(spec.axis_nm.length)
                    .expected(spec.channels);
        }
        if (spec.axis_nm.length == 0 && spec.mask.stream().anyMatch(HeadSpec.Drop::byWavelength)) {
            throw refusal("a mask by wavelength needs a wavelength axis").remedy("give the axis, or mask by channel");
        }
    }

    private static void countSteps(HeadSpec spec) {
        boolean counts = spec.input == InputKind.COUNTS;
        if (spec.corrects() && !counts) {
            throw refusal("dark and white correct raw counts only").found("input " + spec.input.label());
        }
        if ((spec.saturatedAt != null || spec.deadAtOrBelow != null) && !counts) {
            throw refusal("saturated and dead are told by raw counts only").found("input " + spec.input.label());
        }
        if (spec.saturatedAt != null && spec.deadAtOrBelow != null && spec.saturatedAt <= spec.deadAtOrBelow) {
            throw refusal("every count would be saturated or dead")
                    .found("saturatedAt " + DecimalText.shortest(spec.saturatedAt) + ", deadAtOrBelow "
                            + DecimalText.shortest(spec.deadAtOrBelow));
        }
    }

    private static void lightSteps(HeadSpec spec) {
        boolean reflectance = spec.input == InputKind.REFLECTANCE || spec.corrects();
        if (spec.takesLogarithm() && spec.input == InputKind.ABSORBANCE) {
            throw refusal("the logarithm of what is a logarithm already").remedy("leave the log step out");
        }
        if (spec.takesLogarithm() && !reflectance) {
            throw refusal("log10(1/R) needs a reflectance, and " + spec.input.label() + " with no white are none")
                    .remedy("give dark and white references, or leave the log step out");
        }
        if (spec.takesLogarithm() && spec.floor == null) {
            throw refusal("log10(1/R) needs a floor: a reflectance at or below 0 has no logarithm")
                    .remedy("give a floor such as 0.001");
        }
        if ((spec.floor != null || spec.noSignalBelow != null) && !reflectance) {
            throw refusal(
                    "floor and noSignalBelow are reflectances, and " + spec.input.label() + " with no white are none");
        }
        if (spec.floor != null && spec.noSignalBelow != null && spec.floor >= spec.noSignalBelow) {
            throw refusal("with the floor at or above noSignalBelow no record could be no signal")
                    .found("floor " + DecimalText.shortest(spec.floor) + ", noSignalBelow "
                            + DecimalText.shortest(spec.noSignalBelow));
        }
    }

    static void kept(HeadSpec spec, int kept) {
        if (kept == 0) {
            throw refusal("the mask leaves no channel").found("all " + spec.channels + " masked");
        }
        if (spec.appliesSnv() && kept < LEAST_SNV_CHANNELS) {
            throw refusal("SNV on so few channels leaves nothing to tell materials by")
                    .found(kept)
                    .expected("at least " + LEAST_SNV_CHANNELS);
        }
    }

    private static void finite(String key, Double value) {
        if (value != null && !(Math.abs(value) <= Double.MAX_VALUE)) {
            throw refusal(key + " must be a finite number").found(DecimalText.shortest(value));
        }
    }

    private static void positive(String key, Double value) {
        finite(key, value);
        if (value != null && value < Double.MIN_NORMAL) {
            throw refusal(key + " must be above 0").found(DecimalText.shortest(value));
        }
    }

    static Fault refusal(String what) {
        return Fault.usage(what).at("pretreatment");
    }
}
