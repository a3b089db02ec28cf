using System.Collections.Immutable;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Rating.Structures;

/// <summary>One rated effect of one plane: its line, what resists it and what already loads it.</summary>
public sealed class RatedEffect
{
    /// <summary>Unit it belongs to.</summary>
    public required string UnitId { get; init; }

    /// <summary>Id within the unit.</summary>
    public required string EffectId { get; init; }

    /// <summary>Plane it belongs to; one of the unit's two.</summary>
    public required string PlaneId { get; init; }

    /// <summary>What it is, in words.</summary>
    public required string Description { get; init; }

    /// <summary>What it is.</summary>
    public required EffectKind Kind { get; init; }

    /// <summary>Influence line over the structure's chainage, effect per kN of load on the whole plane.</summary>
    public required InfluenceLine Line { get; init; }

    /// <summary>Whether it is a reaction between the unit's outer bearings.</summary>
    public bool InteriorReaction { get; init; }

    /// <summary>Resistances as stated, all methods.</summary>
    public ImmutableArray<Resistance> Resistances { get; init; } = [];

    /// <summary>Dead loads as stated.</summary>
    public ImmutableArray<DeadLoad> DeadLoads { get; init; } = [];

    /// <summary>Kind of member for the system factor, the effect's own and its unit's.</summary>
    public Stated<SystemKind> System { get; init; }

    /// <summary>Condition rating 0 to 9, the effect's own and its structure's.</summary>
    public Stated<int> Condition { get; init; }

    /// <summary>For a vertical reaction: there is no hold-down, so that its uplift capacity is 0 (rule D6).</summary>
    public bool NoHoldDown { get; init; }

    /// <summary>Path of the effect in the contract, for reasons.</summary>
    public required string Path { get; init; }
}
