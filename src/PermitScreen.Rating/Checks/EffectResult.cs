using System.Collections.Immutable;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Checks;

/// <summary>One effect in one sense on one rung, with the whole arithmetic.</summary>
public sealed record EffectResult
{
    /// <summary>The effect.</summary>
    public required RatedEffect Effect { get; init; }

    /// <summary>Sense.</summary>
    public required EffectSense Sense { get; init; }

    /// <summary>Element that would fail, where the resistance names it.</summary>
    public required string Element { get; init; }

    /// <summary>Configuration that governs.</summary>
    public required string ConfigurationId { get; init; }

    /// <summary>Whether Σγ·load ≤ C, unrounded (rule B7).</summary>
    public required bool Passes { get; init; }

    /// <summary>Whether the rating factor is a number.</summary>
    public required RatingFactorState State { get; init; }

    /// <summary>Rating factor; scales all live load. Null where it is no number.</summary>
    public double? RatingFactor { get; init; }

    /// <summary>Largest passing factor k on the permit's axle loads alone (rule B6); null where no axle of it acts.</summary>
    public double? LargestAxleFactor { get; init; }

    /// <summary>Capacity.</summary>
    public required CapacityArithmetic Capacity { get; init; }

    /// <summary>Dead load, term by term.</summary>
    public required ImmutableArray<DeadLoadArithmetic> DeadLoads { get; init; }

    /// <summary>Capacity less factored dead load, kN.</summary>
    public required double NumeratorKn { get; init; }

    /// <summary>Live load, term by term, in the worst arrangement.</summary>
    public required ImmutableArray<LiveLoadArithmetic> LiveLoads { get; init; }

    /// <summary>Sum of factored live load, kN.</summary>
    public required double DenominatorKn { get; init; }
}
