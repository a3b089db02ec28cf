using System.Collections.Immutable;
using PermitScreen.Catalogue.Records;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>A revision with its lines, ready to be screened.</summary>
/// <param name="Record">The revision.</param>
/// <param name="Rated">What the ladder needs; null where there is no roadway.</param>
/// <param name="NotRated">What is not rated.</param>
/// <param name="Lines">Lines of every effect.</param>
/// <param name="LargestResidual">Largest residual of joint equilibrium of its analyses, per unit load.</param>
public sealed record PreparedStructure(
    StructureRecord Record,
    RatedStructure? Rated,
    ImmutableArray<UnratedEffect> NotRated,
    ImmutableArray<NamedLine> Lines,
    double LargestResidual);
