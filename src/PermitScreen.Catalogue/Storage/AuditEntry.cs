namespace PermitScreen.Catalogue.Storage;

/// <summary>One entry of the audit log.</summary>
/// <param name="Sequence">Number, counted from 1 without a gap.</param>
/// <param name="Action">What was done.</param>
/// <param name="Subject">To what: a resource name, an import, or "version N".</param>
/// <param name="Provenance">Who, why, when.</param>
/// <param name="Version">Catalogue version that it made; null where it made none.</param>
/// <param name="Records">Digest over the revisions that it began and ended; of nothing where there are none.</param>
/// <param name="Hash">Digest over this entry and the hash of the one before.</param>
public sealed record AuditEntry(long Sequence, string Action, string Subject, Provenance Provenance, long? Version, Digest Records, Digest Hash);
