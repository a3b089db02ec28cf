using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Rating.Structures;

/// <summary>A vertical reaction that the catalogue does not rate: allowed only while nothing can lift it (rule D6).</summary>
/// <param name="PlaneId">Plane.</param>
/// <param name="Line">Influence line over the structure's chainage.</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Path">Path of the effect in the contract.</param>
public sealed record UnratedBearing(string PlaneId, InfluenceLine Line, string Description, string Path);
