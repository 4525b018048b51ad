package turnstone.moments;

/** Which block kernel the settings ask for. */
public enum KernelChoice {
    /** The vector kernel where this JVM has it, else the scalar one. */
    AUTO,
    /** The vector kernel or a refusal. */
    VECTOR,
    /** The scalar kernel. */
    SCALAR
}
