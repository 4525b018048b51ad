package turnstone.plant;

import java.util.ArrayList;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.TreeSet;

/** Reads groups of targets and duties. */
final class DutyReader {
    /** Shares are decimals by hand: a third written with four digits is let through. */
    private static final double SHARES_MISS = 5e-4;

    private static final double USUAL_CONFIDENCE = 0.95;

    private final List<Material> materials;
    private final List<String> names;
    private final List<String> sorters;

    DutyReader(List<Material> materials, List<String> sorters) {
        this.materials = materials;
        this.names = materials.stream().map(Material::name).toList();
        this.sorters = sorters;
    }

    Map<String, List<String>> groups(Entry root) {
        Map<String, List<String>> groups = new LinkedHashMap<>();
        for (Entry entry : root.optional("groups").map(Entry::items).orElse(List.of())) {
            String name = entry.at("name").text();
            if (names.contains(name) || groups.containsKey(name)) {
                throw entry.fault("the name of a group is taken").found(name).expected("a name of its own");
            }
            groups.put(name, inOrder(Known.names(entry.at("materials"), names, "material")));
        }
        return groups;
    }

    List<Duty> duties(Entry root, Map<String, List<String>> groups) {
        List<Duty> duties = new ArrayList<>();
        for (Entry entry : root.at("duties").items()) {
            Duty duty = duty(entry, groups);
            if (duties.stream().anyMatch(earlier -> earlier.name().equals(duty.name()))) {
                throw entry.fault("duty `" + duty.name() + "` is given twice");
            }
            duties.add(duty);
        }
        return List.copyOf(duties);
    }

    private Duty duty(Entry entry, Map<String, List<String>> groups) {
        List<String> targets = targets(entry.at("targets"), groups);
        Map<String, Double> mix = shares(entry.at("infeedMix"));
        checkMix(entry, targets, mix);
        List<String> machines = entry.optional("sorters")
                .map(list -> Known.names(list, sorters, "sorter"))
                .orElse(sorters);
        return new Duty(
                entry.at("name").text(),
                targets,
                Duty.Stream.of(entry.at("productStream").text()),
                sorters.stream().filter(machines::contains).toList(),
                mix,
                requirements(entry.at("requirements")),
                new DutyTermsReader(names, targets, mix).terms(entry));
    }

    private List<String> targets(Entry list, Map<String, List<String>> groups) {
        List<String> choices = new ArrayList<>(names);
        choices.addAll(groups.keySet());
        TreeSet<String> targets = new TreeSet<>();
        for (String name : Known.names(list, choices, "material or group")) {
            targets.addAll(groups.getOrDefault(name, List.of(name)));
        }
        if (targets.size() == names.size()) {
            throw list.fault("with every material a target there is nothing to sort out");
        }
        return inOrder(targets);
    }

    private List<String> inOrder(java.util.Collection<String> some) {
        return names.stream().filter(some::contains).toList();
    }

    /** Shares by material that sum to 1, made to sum to it exactly as far as doubles go. */
    Map<String, Double> shares(Entry entry) {
        Map<String, Double> shares = new LinkedHashMap<>();
        double sum = 0;
        for (String material : entry.keys()) {
            Known.name(entry, material, names, "material");
            shares.put(material, entry.at(material).number());
            sum += shares.get(material);
        }
        if (!(Math.abs(sum - 1) <= SHARES_MISS)) {
            throw entry.fault("shares must sum to 1").found(sum);
        }
        double whole = sum;
        shares.replaceAll((material, share) -> share / whole);
        return shares;
    }

    private void checkMix(Entry duty, List<String> targets, Map<String, Double> mix) {
        if (targets.stream().allMatch(target -> mix.getOrDefault(target, 0.0) == 0)) {
            throw duty.at("infeedMix")
                    .fault("no target of the duty is in its infeed")
                    .found("targets " + targets);
        }
        List<Material> inMix = materials.stream()
                .filter(material -> mix.getOrDefault(material.name(), 0.0) > 0)
                .toList();
        long weighed = inMix.stream()
                .filter(material -> material.grams_per_cm2().isPresent())
                .count();
        if (weighed != 0 && weighed != inMix.size()) {
            throw duty.at("infeedMix")
                    .fault("mass by area is given for some materials of the infeed and not for others")
                    .found("none for "
                            + String.join(
                                    ", ",
                                    inMix.stream()
                                            .filter(material ->
                                                    material.grams_per_cm2().isEmpty())
                                            .map(Material::name)
                                            .toList()))
                    .expected("grams_per_cm2 for all of them, or for none");
        }
    }

    private static List<Requirement> requirements(Entry list) {
        List<Requirement> requirements = new ArrayList<>();
        for (Entry entry : list.items()) {
            Requirement requirement = new Requirement(
                    Requirement.Figure.of(entry.at("figure").text()),
                    Requirement.Unseen.of(entry.text("unseen", "tray")),
                    Requirement.Reach.of(entry.text("of", Requirement.Reach.THIS_FLEET_TONIGHT.label())),
                    entry.at("least").number(),
                    Requirement.Bound.of(entry.text("bound", "point")),
                    entry.number("confidence", USUAL_CONFIDENCE));
            if (requirements.stream().anyMatch(earlier -> earlier.name().equals(requirement.name()))) {
                throw entry.fault("requirement `" + requirement.name() + "` is given twice");
            }
            requirements.add(requirement);
        }
        return requirements;
    }
}
