namespace PermitScreen.Catalogue.Records;

/// <summary>A limit that may be absent, stated as none, or a length.</summary>
/// <param name="Stated">Whether anything is said.</param>
/// <param name="LimitM">The limit, m; null where it is stated that there is none.</param>
public readonly record struct ClearLimit(bool Stated, double? LimitM);
