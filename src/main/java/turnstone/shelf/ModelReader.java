package turnstone.shelf;

import com.fasterxml.jackson.databind.JsonNode;

/** Knows the form of models: tells a model's fingerprint after checking that its content has it. */
@FunctionalInterface
public interface ModelReader {
    /**
     * The fingerprint of a model.
     *
     * @param model the content of a model file
     * @param place where it is, for messages
     * @throws turnstone.fault.Fault where it is not a model, or its content is not what its fingerprint says
     */
    String fingerprint(JsonNode model, String place);
}
