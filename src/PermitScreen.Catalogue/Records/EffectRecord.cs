using System.Collections.Immutable;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Records;

/// <summary>One effect of a unit as the catalogue states it, for one or more planes.</summary>
public sealed record EffectRecord
{
    /// <summary>Id within the unit.</summary>
    public required string EffectId { get; init; }

    /// <summary>Planes that it stands for.</summary>
    public required ImmutableArray<string> PlaneIds { get; init; }

    /// <summary>What it is; null where it is of a kind that is not modelled yet.</summary>
    public TrussQuantity? Quantity { get; init; }

    /// <summary>Words, for instance "axial force in L2L3".</summary>
    public required string Description { get; init; }

    /// <summary>Why it is not rated; null where it is.</summary>
    public string? NotRatedReason { get; init; }

    /// <summary>Resistances, where rated.</summary>
    public ImmutableArray<Resistance> Resistances { get; init; } = [];

    /// <summary>Dead loads, where rated.</summary>
    public ImmutableArray<DeadLoad> DeadLoads { get; init; } = [];

    /// <summary>Kind of member for the system factor, the effect's own and its unit's.</summary>
    public Stated<SystemKind> System { get; init; }

    /// <summary>Condition rating 0 to 9, the effect's own and its structure's.</summary>
    public Stated<int> Condition { get; init; }

    /// <summary>Whether the catalogue states that a bearing has no hold-down.</summary>
    public bool NoHoldDown { get; init; }

    /// <summary>What keeps it from being assessed.</summary>
    public ImmutableArray<Reason> Gaps { get; init; } = [];

    /// <summary>Path of the effect in the contract.</summary>
    public required string Path { get; init; }
}
