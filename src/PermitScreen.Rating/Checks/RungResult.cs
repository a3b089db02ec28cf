using System.Collections.Immutable;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Rating.Checks;

/// <summary>One rung of the ladder.</summary>
/// <param name="Rung">The rung.</param>
/// <param name="Outcome">Outcome.</param>
/// <param name="Reasons">Reasons, where it does not pass.</param>
/// <param name="Effects">Every effect and sense rated, the governing one first.</param>
public sealed record RungResult(Rung Rung, RungOutcome Outcome, ImmutableArray<Reason> Reasons, ImmutableArray<EffectResult> Effects)
{
    /// <summary>The governing effect, or null where none was rated.</summary>
    public EffectResult? Governing => Effects.IsEmpty ? null : Effects[0];

    /// <summary>Least rating factor of all effects; null where there is no number, above all where dead load alone exceeds a capacity.</summary>
    public double? RatingFactor => Governing?.State == RatingFactorState.DeadLoadExceeds ? null : Effects.Min(e => e.RatingFactor);

    /// <summary>Least k of all effects; null where there is none.</summary>
    public double? LargestAxleFactor => Effects.Min(e => e.LargestAxleFactor);
}
