namespace PermitScreen.Catalogue.Storage;

/// <summary>Begins an import.</summary>
/// <param name="ImportId">Id.</param>
/// <param name="SourceFingerprint">Fingerprint of what is imported.</param>
/// <param name="AllowPartial">Whether it is published without the items refused.</param>
/// <param name="Provenance">Who, why, when.</param>
public sealed record ImportBeginning(string ImportId, string SourceFingerprint, bool AllowPartial, Provenance Provenance);
