namespace PermitScreen.Catalogue.Snapshots;

/// <summary>An effect that is not rated, with the catalogue's reason.</summary>
/// <param name="UnitId">Unit.</param>
/// <param name="EffectId">Effect.</param>
/// <param name="PlaneId">Plane.</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Reason">Why.</param>
public sealed record UnratedEffect(string UnitId, string EffectId, string PlaneId, string Description, string Reason);
