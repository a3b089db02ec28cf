namespace PermitScreen.Catalogue.Records;

/// <summary>Room for a vehicle on one way past the structure.</summary>
/// <param name="Height">Clear height.</param>
/// <param name="Width">Clear width.</param>
/// <param name="HasProfile">Whether a height profile is given, which is not modelled yet.</param>
public sealed record Clearance(ClearLimit Height, ClearLimit Width, bool HasProfile);
