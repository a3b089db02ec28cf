namespace PermitScreen.Catalogue.Storage;

/// <summary>An import and how far it is.</summary>
/// <param name="ImportId">Id.</param>
/// <param name="State">State.</param>
/// <param name="Provenance">Who began it, why, when.</param>
/// <param name="SourceFingerprint">Fingerprint of what is imported, as the caller gave it.</param>
/// <param name="AllowPartial">Whether it is published without the items refused.</param>
/// <param name="BaseVersion">Catalogue version when it was begun.</param>
/// <param name="NextPiece">Pieces staged, counted from index 0 without a gap.</param>
/// <param name="Staged">Items staged without fault.</param>
/// <param name="Refused">Items refused.</param>
/// <param name="Result">What publishing did; null before.</param>
public sealed record ImportHead(
    string ImportId,
    ImportState State,
    Provenance Provenance,
    string SourceFingerprint,
    bool AllowPartial,
    long BaseVersion,
    int NextPiece,
    int Staged,
    int Refused,
    ImportResult? Result);
