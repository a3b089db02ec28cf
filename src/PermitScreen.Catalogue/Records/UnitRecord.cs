using System.Collections.Immutable;
using PermitScreen.Mechanics.Trusses;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Records;

/// <summary>One superstructure unit.</summary>
public sealed record UnitRecord
{
    /// <summary>Id within the structure.</summary>
    public required string UnitId { get; init; }

    /// <summary>Chainage of its datum, m.</summary>
    public required double StartChainageM { get; init; }

    /// <summary>The truss; null where the unit is of a kind that is not modelled yet.</summary>
    public TrussModel? Truss { get; init; }

    /// <summary>Planes from left to right.</summary>
    public ImmutableArray<Plane> Planes { get; init; } = [];

    /// <summary>Effects, rated or not.</summary>
    public ImmutableArray<EffectRecord> Effects { get; init; } = [];

    /// <summary>What keeps the unit from being assessed.</summary>
    public ImmutableArray<Reason> Gaps { get; init; } = [];

    /// <summary>Path of the unit in the contract.</summary>
    public required string Path { get; init; }
}
