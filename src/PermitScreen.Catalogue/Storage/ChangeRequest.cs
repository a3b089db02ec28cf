namespace PermitScreen.Catalogue.Storage;

/// <summary>A change set of one edit.</summary>
/// <param name="Action">What is done, for the log, for instance "update structure".</param>
/// <param name="Edit">The edit.</param>
/// <param name="Provenance">Who, why, when.</param>
/// <param name="Stamp">Makes a retry harmless; null where the caller gave no request id.</param>
public sealed record ChangeRequest(string Action, Edit Edit, Provenance Provenance, RequestStamp? Stamp);
