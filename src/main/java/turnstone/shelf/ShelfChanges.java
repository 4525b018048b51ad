package turnstone.shelf;

import java.time.Clock;
import java.time.Instant;
import java.time.temporal.ChronoUnit;
import java.util.Collections;
import java.util.List;
import java.util.Optional;
import java.util.SortedSet;
import turnstone.fault.Fault;

/** Works out the entry that a wish comes to, or why it is refused; writes nothing. */
final class ShelfChanges {
    private final String place;
    private final List<ShelfEntry> history;
    private final ServiceSteps steps;
    private final SigningRule rule;
    private final Instant now;

    ShelfChanges(String place, List<ShelfEntry> history, SigningRule rule, Clock clock) {
        this.place = place;
        this.history = history;
        this.steps = ServiceSteps.of(history);
        this.rule = rule;
        Instant instant = clock.instant().truncatedTo(ChronoUnit.MILLIS);
        // Clocks of two machines may disagree: no entry is older than the one before it.
        this.now = history.isEmpty() || !history.get(history.size() - 1).at().isAfter(instant)
                ? instant
                : history.get(history.size() - 1).at();
    }

    /** A release of model {@code to}. */
    ShelfEntry release(Release wish, String to) {
        requireNotWithdrawn(wish, to);
        Optional<Service> before = steps.now();
        SortedSet<String> sorters = wish.sorters();
        if (!sorters.isEmpty() && before.isEmpty()) {
            throw Fault.input("a release to some sorters needs a model in service on the others")
                    .at(place)
                    .found("nothing in service")
                    .remedy("release a model to the whole fleet first");
        }
        Service after = sorters.isEmpty() ? Service.whole(to) : before.get().with(sorters, to);
        if (before.equals(Optional.of(after))) {
            throw Fault.input("this model is in service already").at(place).found(to);
        }
        Optional<ModelSignature> signature = wish.key().map(key -> key.sign(to));
        requireSigned(to, signature);
        return new ShelfEntry(
                history.size() + 1L,
                now,
                wish.by(),
                Action.RELEASE,
                before.map(service -> ran(service, sorters)),
                to,
                wish.verdict(),
                wish.reason(),
                sorters,
                after,
                Optional.empty(),
                signature);
    }

    /** One step back. */
    ShelfEntry revert(String reason, String by) {
        Service after = steps.before().orElseThrow(this::nothingBefore);
        Service before = steps.now().orElseThrow();
        return back(Action.REVERT, before, after, Optional.empty(), reason, by);
    }

    /** Takes a model away and puts back what ran before it. */
    ShelfEntry withdraw(String model, String reason, String by) {
        ShelfEntry earlier = steps.withdrawn().get(model);
        if (earlier != null) {
            throw Fault.input("this model is withdrawn already")
                    .at(place)
                    .found("entry " + earlier.number() + ", by " + earlier.by() + ": " + earlier.reason());
        }
        Service before = steps.now()
                .orElseThrow(() -> Fault.input("nothing was ever in service, so there is nothing to withdraw")
                        .at(place)
                        .found(model)
                        .remedy("a model that is not released does nothing"));
        Service after = steps.afterWithdrawing(model)
                .orElseThrow(() -> Fault.input("the model is in service, and there is no earlier one to put back")
                        .at(place)
                        .found(model)
                        .remedy("release another model first, then withdraw this one"));
        return back(Action.WITHDRAW, before, after, Optional.of(model), reason, by);
    }

    private ShelfEntry back(
            Action action, Service before, Service after, Optional<String> withdrawn, String reason, String by) {
        boolean whole = !before.fleet().equals(after.fleet());
        SortedSet<String> sorters = whole ? Collections.emptySortedSet() : before.differences(after);
        for (String model : after.models()) {
            if (!before.models().contains(model)) {
                requireSigned(model, Optional.empty());
            }
        }
        return new ShelfEntry(
                history.size() + 1L,
                now,
                by,
                action,
                Optional.of(ran(before, sorters)),
                ran(after, sorters),
                Optional.empty(),
                reason,
                sorters,
                after,
                withdrawn,
                Optional.empty());
    }

    /** What these sorters run; the fleet's where there is no one model. */
    private static String ran(Service service, SortedSet<String> sorters) {
        List<String> models = sorters.stream().map(service::on).distinct().toList();
        return models.size() == 1 ? models.get(0) : service.fleet();
    }

    private void requireNotWithdrawn(Release wish, String to) {
        ShelfEntry entry = steps.withdrawn().get(to);
        if (entry != null && wish.ifWithdrawn() == Release.IfWithdrawn.REFUSE) {
            throw Fault.input("this model was withdrawn")
                    .at(place)
                    .found("entry " + entry.number() + ", by " + entry.by() + ": " + entry.reason())
                    .remedy("to release it all the same say --although-withdrawn");
        }
    }

    private void requireSigned(String model, Optional<ModelSignature> brought) {
        if (brought.isPresent() && !rule.accepts(brought.get(), model)) {
            throw Fault.usage("the signing key is not the plant's")
                    .at(place)
                    .found(brought.get().key())
                    .expected(rule.key().map(Object::toString).orElse("a signature that holds"))
                    .remedy("sign with the private key that belongs to the plant file's public key");
        }
        if (rule.unsigned() == SigningRule.Unsigned.REFUSED && brought.isEmpty() && !isSigned(model)) {
            throw Fault.input("an unsigned model may not go in service: the plant file says so")
                    .at(place)
                    .found("no signature of " + model
                            + rule.key().map(key -> " by " + key).orElse(""))
                    .remedy("release with --key FILE");
        }
    }

    private boolean isSigned(String model) {
        return Signatures.of(history, model).stream().anyMatch(signature -> rule.accepts(signature, model));
    }

    private Fault nothingBefore() {
        String withdrawn = steps.withdrawn().isEmpty()
                ? ""
                : "; " + steps.withdrawn().size() + " withdrawn, which a revert passes over";
        return Fault.input("there is no earlier model to go back to")
                .at(place)
                .found(steps.now()
                        .map(service -> "only model " + service.fleet() + withdrawn)
                        .orElse("nothing in service"))
                .remedy("release another model");
    }
}
