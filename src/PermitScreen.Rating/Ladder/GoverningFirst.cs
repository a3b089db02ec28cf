using PermitScreen.Rating.Checks;

namespace PermitScreen.Rating.Ladder;

/// <summary>Order of results, the governing one first; equal ones by unit, effect, plane and sense, so that every run names the same.</summary>
public sealed class GoverningFirst : IComparer<EffectResult>
{
    private GoverningFirst()
    {
    }

    /// <summary>The order.</summary>
    public static GoverningFirst Order { get; } = new();

    /// <inheritdoc/>
    public int Compare(EffectResult? x, EffectResult? y)
    {
        ArgumentNullException.ThrowIfNull(x);
        ArgumentNullException.ThrowIfNull(y);
        var order = Rank(x).CompareTo(Rank(y));
        order = order != 0 ? order : x.Passes.CompareTo(y.Passes);
        order = order != 0 ? order : (x.State == RatingFactorState.DeadLoadExceeds ? x.NumeratorKn : x.RatingFactor ?? 0)
            .CompareTo(y.State == RatingFactorState.DeadLoadExceeds ? y.NumeratorKn : y.RatingFactor ?? 0);
        order = order != 0 ? order : string.CompareOrdinal(x.Effect.UnitId, y.Effect.UnitId);
        order = order != 0 ? order : string.CompareOrdinal(x.Effect.EffectId, y.Effect.EffectId);
        order = order != 0 ? order : string.CompareOrdinal(x.Effect.PlaneId, y.Effect.PlaneId);
        order = order != 0 ? order : x.Sense.CompareTo(y.Sense);
        return order != 0 ? order : string.CompareOrdinal(x.ConfigurationId, y.ConfigurationId);
    }

    private static int Rank(EffectResult result) => result.State switch
    {
        RatingFactorState.DeadLoadExceeds => 0,
        RatingFactorState.Number => 1,
        _ => 2,
    };
}
