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
        if (OnlyEmptyCounts(line, train, sense, directions))
        {
            return new Extreme(0, null);
        }

        var passes = new Passes(line, train, sense, directions, rule);
        var extreme = passes.Judged(sense);
        passes.Return();
        return extreme ?? PlainExtremes.Of(line, train, sense, directions, rule);
    }

    /// <summary>Supremum and infimum at once: where weights are as declared, from the same passes, in little more than the time of one.</summary>
    /// <param name="line">Influence line, effect per kN.</param>
    /// <param name="train">Axles, kN and m.</param>
    /// <param name="directions">Directions of travel to look at.</param>
    /// <param name="rule">Weighing tolerance and relieving axles.</param>
    /// <returns>What <see cref="Of"/> gives for <see cref="Sense.Max"/> and for <see cref="Sense.Min"/>, to the bit.</returns>
    public static (Extreme Max, Extreme Min) Both(InfluenceLine line, AxleTrain train, TravelDirections directions, WeighingRule rule)
    {
        if (rule is not { Tolerance: 0, RelievingAxlesCount: true }
            || OnlyEmptyCounts(line, train, Sense.Max, directions)
            || OnlyEmptyCounts(line, train, Sense.Min, directions))
        {
            return (Of(line, train, Sense.Max, directions, rule), Of(line, train, Sense.Min, directions, rule));
        }

        var passes = new Passes(line, train, Sense.Max, directions, rule);
        var max = passes.Judged(Sense.Max);
        passes.Negate();
        var min = passes.Judged(Sense.Min);
        passes.Return();
        return (max ?? PlainExtremes.Of(line, train, Sense.Max, directions, rule), min ?? PlainExtremes.Of(line, train, Sense.Min, directions, rule));
    }

    /// <summary>Whether no axle can stand on an ordinate that counts in this sense.</summary>
    private static bool OnlyEmptyCounts(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions) =>
        (directions & TravelDirections.Both) == TravelDirections.None
        || (train.HasNegativeLoad ? line.MaxAbs == 0 : !(sense == Sense.Max ? line.HasPositive : line.HasNegative));

    /// <summary>The passes of a train in the directions asked for; a direction not asked for is a pass without events.</summary>
    private ref struct Passes
    {
        private readonly InfluenceLine _line;
        private readonly AxleTrain _train;
        private readonly WeighingRule _rule;
        private DirectionSweep _forward;
        private DirectionSweep _reverse;

        internal Passes(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
        {
            _line = line;
            _train = train;
            _rule = rule;
            var bends = Bends.Of(line, sense, rule, train.HasNegativeLoad);
            if ((directions & TravelDirections.Forward) == TravelDirections.Forward)
            {
                _forward = DirectionSweep.Run(bends, train, TravelDirection.Forward);
            }

            if ((directions & TravelDirections.Reverse) == TravelDirections.Reverse)
            {
                _reverse = DirectionSweep.Run(bends, train, TravelDirection.Reverse);
            }

            bends.Return();
        }

        internal void Negate()
        {
            _forward.Negate();
            _reverse.Negate();
        }

        internal readonly void Return()
        {
            _forward.Return();
            _reverse.Return();
        }

        /// <summary>The extreme, or <see langword="null"/> where only the plain path can tell.</summary>
        internal readonly Extreme? Judged(Sense sense)
        {
            var width = TieRule.WidthOf(_line, _train);
            var error = Math.Max(_forward.Error, _reverse.Error);
            var level = Math.Max(_forward.Top, _reverse.Top) - width - (2 * error);
            if (!(level > 0) || _forward.Doubtful || _reverse.Doubtful)
            {
                return null;
            }

            var ahead = new Finalists(_line, _train, sense, _rule, TravelDirection.Forward);
            var back = new Finalists(_line, _train, sense, _rule, TravelDirection.Reverse);
            var best = Math.Max(ahead.Best(_forward, level), back.Best(_reverse, level));
            if (!(best >= level + width + error && best - width > 0))
            {
                return null;
            }

            var position = ahead.First(_forward, level, best - width) ?? back.First(_reverse, level, best - width);
            return new Extreme(Response.At(_line, _train, position!.Value, sense, _rule), position);
        }
    }
}
