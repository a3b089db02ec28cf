using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>A kept influence line, over the structure's chainage.</summary>
/// <param name="UnitId">Unit.</param>
/// <param name="EffectId">Effect.</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Line">The line.</param>
public sealed record NamedLine(string UnitId, string EffectId, string Description, InfluenceLine Line);
