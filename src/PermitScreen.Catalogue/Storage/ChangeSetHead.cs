namespace PermitScreen.Catalogue.Storage;

/// <summary>One change set: one catalogue version.</summary>
/// <param name="Version">Catalogue version that it made.</param>
/// <param name="Action">What was done.</param>
/// <param name="Provenance">Who, why, when.</param>
/// <param name="Added">Resources added.</param>
/// <param name="Revised">Resources revised.</param>
/// <param name="Removed">Resources taken out.</param>
public sealed record ChangeSetHead(long Version, string Action, Provenance Provenance, int Added, int Revised, int Removed);
