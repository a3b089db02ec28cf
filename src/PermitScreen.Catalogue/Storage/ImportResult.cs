namespace PermitScreen.Catalogue.Storage;

/// <summary>What publishing an import did.</summary>
/// <param name="Added">Resources added.</param>
/// <param name="Revised">Resources revised.</param>
/// <param name="Unchanged">Resources whose content was the same.</param>
/// <param name="Version">Catalogue version that it made; null where nothing changed.</param>
public sealed record ImportResult(int Added, int Revised, int Unchanged, long? Version);
