package turnstone.measure;

/** What a proposed count scale is for. */
public enum ProposalKind {
    /** Recorded values: the largest power-of-ten step that loses nothing; where not even fine counts can hold that, the least step they can hold. */
    LOSSLESS,
    /** As {@link #LOSSLESS}, but a channel that can't be held without loss is refused, named. */
    LOSSLESS_OR_REFUSED,
    /** Values that the head computes: 4 times the range seen over 2^22, rounded up to two significant digits. */
    COMPUTED
}
