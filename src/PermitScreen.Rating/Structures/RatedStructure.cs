using System.Collections.Immutable;

namespace PermitScreen.Rating.Structures;

/// <summary>What the ladder needs of a structure.</summary>
/// <param name="Roadway">Roadway.</param>
/// <param name="Units">Units that can be rated.</param>
/// <param name="Gaps">What keeps the structure from being assessed on any rung.</param>
public sealed record RatedStructure(Roadway Roadway, ImmutableArray<RatedUnit> Units, ImmutableArray<Checks.Reason> Gaps);
