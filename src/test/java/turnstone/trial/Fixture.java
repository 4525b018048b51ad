package turnstone.trial;

import java.time.LocalDate;
import java.util.ArrayList;
import java.util.List;
import java.util.Map;
import turnstone.plant.Duty;
import turnstone.plant.Requirement;

/** Tallies written by hand for duties of a few materials. */
final class Fixture {
    final List<TrialShowing> showings = new ArrayList<>();
    final TrialTally tally = TrialTally.empty();

    static Duty duty(Duty.Stream stream, Map<String, Double> mix, Requirement... requirements) {
        List<String> sorters = List.of("avocet", "curlew", "dunlin", "godwit", "knot", "plover");
        return new Duty("PET out", List.of("PET"), stream, sorters, mix, List.of(requirements));
    }

    static Requirement purity(double least, Requirement.Bound bound) {
        return new Requirement(Requirement.Figure.DECISION_PURITY, Requirement.Unseen.TRAY, least, bound, 0.90);
    }

    static Requirement recovery(double least, Requirement.Bound bound) {
        return new Requirement(Requirement.Figure.DECISION_RECOVERY, Requirement.Unseen.TRAY, least, bound, 0.90);
    }

    /** A showing with records decided PET, decided PP, decided PET but unfamiliar, and without signal. */
    Fixture showing(String sorter, String material, long pet, long pp, long unfamiliar, long noSignal) {
        return showing(LocalDate.of(2026, 3, 13), sorter, material, pet, pp, unfamiliar, noSignal);
    }

    /** The same on a day. */
    Fixture showing(LocalDate day, String sorter, String material, long pet, long pp, long unfamiliar, long noSignal) {
        String id = "s" + (100 + showings.size());
        showings.add(new TrialShowing(id, day, sorter, sorter + "@2026-01-01", material + "-1", 1, material));
        tally.add(new TallyCell(id, material, "PET", Recognition.FAMILIAR), pet);
        tally.add(new TallyCell(id, material, "PP", Recognition.FAMILIAR), pp);
        tally.add(new TallyCell(id, material, "PET", Recognition.UNFAMILIAR), unfamiliar);
        tally.add(TallyCell.noSignal(id, material), noSignal);
        return this;
    }

    /** Two showings of PET with 17 of 20 familiar and decided PET, two of PVC with 1 of 20, two of PP with none. */
    static Fixture small() {
        return new Fixture()
                .showing("avocet", "PET", 9, 0, 0, 1)
                .showing("avocet", "PET", 8, 1, 1, 0)
                .showing("avocet", "PVC", 1, 8, 1, 0)
                .showing("avocet", "PVC", 0, 9, 0, 1)
                .showing("avocet", "PP", 0, 10, 0, 0)
                .showing("avocet", "PP", 0, 10, 0, 0);
    }

    /** Six sorters with four showings of PET and of PP each, errors as given by a repeating pattern. */
    static Fixture fleet(long lost, long[] pattern) {
        return fleet(lost, pattern, 1);
    }

    /** The same over some days that end with 13 March. */
    static Fixture fleet(long lost, long[] pattern, int days) {
        Fixture fixture = new Fixture();
        int i = 0;
        for (int d = days - 1; d >= 0; d--) {
            LocalDate day = LocalDate.of(2026, 3, 13).minusDays(d);
            for (String sorter : List.of("avocet", "curlew", "dunlin", "godwit", "knot", "plover")) {
                for (int k = 0; k < 4; k++) {
                    long errors = lost + pattern[i % pattern.length];
                    long sent = pattern[(i + 1) % pattern.length];
                    fixture.showing(day, sorter, "PET", 100 - errors, errors, 0, 0);
                    fixture.showing(day, sorter, "PP", sent, 100 - sent, 0, 0);
                    i++;
                }
            }
        }
        return fixture;
    }
}
