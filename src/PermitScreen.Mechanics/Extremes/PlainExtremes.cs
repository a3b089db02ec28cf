using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Extremes by looking at every position at which the response can have one: every axle at every breakpoint, both sides.</summary>
/// <remarks>
/// Between such positions the response is linear in the lead axle's chainage, so its supremum and infimum are one-sided limits at them.
/// This is the oracle: short, scalar, in a fixed order. <see cref="SweepExtremes"/> gives the same bits faster. O(directions · breakpoints · axles²).
/// </remarks>
public static class PlainExtremes
{
    /// <summary>The supremum or infimum over all positions in the directions asked for, the empty structure included.</summary>
    /// <param name="line">Influence line, effect per kN.</param>
    /// <param name="train">Axles, kN and m.</param>
    /// <param name="sense">Supremum or infimum.</param>
    /// <param name="directions">Directions of travel to look at.</param>
    /// <param name="rule">Weighing tolerance and relieving axles.</param>
    /// <returns>
    /// The value is <see cref="Response.At"/> at the position. Values within 1e-12·Σ|w|·max|η| of the best are ties; of those the empty structure is
    /// reported first (value 0, no position), then forward before reverse, then the smallest lead chainage, then the side below before the side above.
    /// </returns>
    public static Extreme Of(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
    {
        var sign = sense == Sense.Max ? 1.0 : -1.0;
        var best = 0.0;
        foreach (var p in Candidates(line, train, directions))
        {
            best = Math.Max(best, sign * Response.At(line, train, p, sense, rule));
        }

        var least = best - TieRule.WidthOf(line, train);
        if (least <= 0)
        {
            return new Extreme(0, null);
        }

        TrainPosition? first = null;
        foreach (var p in Candidates(line, train, directions))
        {
            if (sign * Response.At(line, train, p, sense, rule) >= least && (first is null || TieRule.Precedes(p, first.Value)))
            {
                first = p;
            }
        }

        return new Extreme(Response.At(line, train, first!.Value, sense, rule), first);
    }

    private static IEnumerable<TrainPosition> Candidates(InfluenceLine line, AxleTrain train, TravelDirections directions)
    {
        foreach (var direction in DirectionsIn(directions))
        {
            for (var axle = 0; axle < train.Count; axle++)
            {
                for (var k = 0; k < line.Count; k++)
                {
                    var leadM = direction == TravelDirection.Forward ? line.XM[k] + train.OffsetsM[axle] : line.XM[k] - train.OffsetsM[axle];
                    yield return new TrainPosition(leadM, direction, Side.Before);
                    yield return new TrainPosition(leadM, direction, Side.After);
                }
            }
        }
    }

    private static TravelDirection[] DirectionsIn(TravelDirections directions) => directions switch
    {
        TravelDirections.Forward => [TravelDirection.Forward],
        TravelDirections.Reverse => [TravelDirection.Reverse],
        TravelDirections.Both => [TravelDirection.Forward, TravelDirection.Reverse],
        _ => [],
    };
}
