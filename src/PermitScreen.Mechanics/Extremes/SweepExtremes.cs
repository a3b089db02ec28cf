using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Extremes by the fast path: the same value and position as <see cref="PlainExtremes"/>, to the bit.</summary>
/// <remarks>
/// The events (an axle meets a bend of the line) are put into order and one pass keeps the running response and its slope; when the train has
/// left, the sum must be zero within its error bound. The pass is approximate with a known bound: it only tells which positions may hold the
/// extreme or tie with it. Those are judged by <see cref="Response.At"/> as on the plain path. Where the bound cannot decide (an extreme that is
/// zero but for rounding, jumps closer than they can be told apart, a sum that does not close), the plain path answers.
/// O(bends · axles · log(min(bends, axles))); allocates nothing that lasts.
/// </remarks>
public static class SweepExtremes
{
    /// <inheritdoc cref="PlainExtremes.Of"/>
    public static Extreme Of(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
    {
        if ((directions & TravelDirections.Both) == TravelDirections.None || (!train.HasNegativeLoad && !(sense == Sense.Max ? line.HasPositive : line.HasNegative)))
        {
            // Every ordinate on an axle is of the other sign or 0: the empty structure governs.
            return new Extreme(0, null);
        }

        var bends = Bends.Of(line, sense, rule, train.HasNegativeLoad);
        var extreme = bends.Count == 0 ? null : Swept(bends, line, train, sense, directions, rule);
        bends.Return();
        return extreme ?? PlainExtremes.Of(line, train, sense, directions, rule);
    }

    /// <summary>The extreme, or <see langword="null"/> where only the plain path can tell.</summary>
    private static Extreme? Swept(scoped in Bends bends, InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
    {
        var forward = (directions & TravelDirections.Forward) == TravelDirections.Forward
            ? DirectionSweep.Run(bends, train, TravelDirection.Forward)
            : default;
        var reverse = (directions & TravelDirections.Reverse) == TravelDirections.Reverse
            ? DirectionSweep.Run(bends, train, TravelDirection.Reverse)
            : default;
        var extreme = Judged(forward, reverse, line, train, sense, rule);
        forward.Return();
        reverse.Return();
        return extreme;
    }

    private static Extreme? Judged(
        scoped in DirectionSweep forward, scoped in DirectionSweep reverse, InfluenceLine line, AxleTrain train, Sense sense, WeighingRule rule)
    {
        var width = TieRule.WidthOf(line, train);
        var error = Math.Max(forward.Error, reverse.Error);
        var level = Math.Max(forward.Top, reverse.Top) - width - (2 * error);
        if (!(level > 0) || forward.Doubtful || reverse.Doubtful)
        {
            return null;
        }

        var ahead = new Finalists(line, train, sense, rule, TravelDirection.Forward);
        var back = new Finalists(line, train, sense, rule, TravelDirection.Reverse);
        var best = Math.Max(ahead.Best(forward, level), back.Best(reverse, level));
        if (!(best >= level + width + error && best - width > 0))
        {
            return null;
        }

        var position = ahead.First(forward, level, best - width) ?? back.First(reverse, level, best - width);
        return new Extreme(Response.At(line, train, position!.Value, sense, rule), position);
    }
}
