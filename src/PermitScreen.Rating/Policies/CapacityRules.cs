using System.Collections.Immutable;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Policies;

/// <summary>How a resistance becomes a capacity (rule D1).</summary>
/// <param name="ConditionFactors">Condition factors by band; the band from 0 is always there.</param>
/// <param name="SystemFactors">System factor by kind of member.</param>
/// <param name="FactorFloor">Least product of condition and system factor at strength limit states.</param>
/// <param name="ConditionFactorOnMeasuredLoss">Whether the condition factor also applies where measured loss is in the resistance.</param>
public sealed record CapacityRules(
    ImmutableArray<ConditionFactor> ConditionFactors,
    ImmutableDictionary<SystemKind, double> SystemFactors,
    double FactorFloor,
    bool ConditionFactorOnMeasuredLoss)
{
    /// <summary>The condition factor of a rating: that of the highest band that begins at or below it.</summary>
    /// <param name="rating">Condition rating, 0 to 9.</param>
    public double ConditionFactorOf(int rating) =>
        ConditionFactors.Where(f => f.FromRating <= rating).MaxBy(f => f.FromRating)?.Factor
        ?? throw new InvalidOperationException("A checked policy has a condition factor from rating 0.");
}
