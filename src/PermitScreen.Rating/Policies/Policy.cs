using System.Collections.Immutable;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Policies;

/// <summary>A policy: every number of a rating, complete and checked. The rules themselves are in the code.</summary>
public sealed record Policy
{
    /// <summary>Rating method.</summary>
    public required RatingMethod Method { get; init; }

    /// <summary>Limit state rated.</summary>
    public required LimitState LimitState { get; init; }

    /// <summary>Level, where the method knows levels.</summary>
    public required RatingLevel Level { get; init; }

    /// <summary>Load factors per dead-load component.</summary>
    public required ImmutableArray<DeadLoadFactor> DeadLoadFactors { get; init; }

    /// <summary>Rows of live-load factors.</summary>
    public required ImmutableArray<LiveLoadRow> LiveLoadRows { get; init; }

    /// <summary>Travel conditions, least restrictive first; at least one.</summary>
    public required ImmutableArray<Rung> Rungs { get; init; }

    /// <summary>The vehicle in each other lane; null where no rung asks for one.</summary>
    public OtherLaneLoad? OtherLane { get; init; }

    /// <summary>The uniform load in the permit's lane; null where no rung asks for one.</summary>
    public SameLaneLoad? SameLane { get; init; }

    /// <summary>Where vehicles may stand across the roadway.</summary>
    public required LateralRules Lateral { get; init; }

    /// <summary>Multiple presence by number of vehicles side by side; index 0 is one vehicle.</summary>
    public required ImmutableArray<double> MultiplePresence { get; init; }

    /// <summary>From resistance to capacity.</summary>
    public required CapacityRules Capacity { get; init; }

    /// <summary>How axle weights are trusted.</summary>
    public required Mechanics.Extremes.WeighingRule Weighing { get; init; }

    /// <summary>The factors of a component; null where the policy has none.</summary>
    /// <param name="component">Component of dead load.</param>
    public DeadLoadFactor? FactorOf(DeadLoadComponent component) => DeadLoadFactors.FirstOrDefault(f => f.Component == component);
}
