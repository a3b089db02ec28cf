using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>The positions of one direction that may hold the extreme, or tie with it, judged by <see cref="Response.At"/> alone.</summary>
/// <remarks>
/// A sweep's responses are straight between its events, so the chainages at which the response may reach a level are known stretches; every
/// axle-at-breakpoint position in them (also at breakpoints where the line does not bend) is looked at. Stretches are widened, never narrowed: a
/// position too many costs time, one too few would be an error.
/// </remarks>
internal readonly ref struct Finalists(InfluenceLine line, AxleTrain train, Sense sense, WeighingRule rule, TravelDirection direction)
{
    /// <summary>More than any rounding of a chainage, and than the width of a snapped jump, m.</summary>
    private const double WidenM = 4 * InfluenceLine.SnapM;

    private readonly double _sign = sense == Sense.Max ? 1 : -1;

    /// <summary>The largest response (times −1 for a minimum) over the stretches at which the sweep reaches a level.</summary>
    internal double Best(scoped in DirectionSweep sweep, double level)
    {
        var seen = new Seen { Least = double.PositiveInfinity };
        Look(sweep, level, ref seen);
        return seen.Best;
    }

    /// <summary>The first position by the tie rule with a response (times −1 for a minimum) not below <paramref name="least"/>.</summary>
    internal TrainPosition? First(scoped in DirectionSweep sweep, double level, double least)
    {
        var seen = new Seen { Least = least };
        Look(sweep, level, ref seen);
        return seen.First;
    }

    private void Look(scoped in DirectionSweep sweep, double level, ref Seen seen)
    {
        var leads = sweep.LeadsM;
        var before = sweep.Before;
        var after = sweep.After;
        double openM = double.PositiveInfinity, closeM = double.NegativeInfinity;
        for (var i = 0; i < leads.Length; i++)
        {
            if (!(before[i] >= level || after[i] >= level))
            {
                continue;
            }

            var fromM = i > 0 ? Reaches(leads[i], before[i], leads[i - 1], after[i - 1], level) : leads[i];
            var toM = i + 1 < leads.Length ? Reaches(leads[i], after[i], leads[i + 1], before[i + 1], level) : leads[i];
            if (fromM - WidenM > closeM)
            {
                LookBetween(openM, closeM, ref seen);
                openM = fromM - WidenM;
            }

            closeM = toM + WidenM;
        }

        LookBetween(openM, closeM, ref seen);
    }

    /// <summary>How far from an event towards its neighbour the response stays at or above a level.</summary>
    private static double Reaches(double hereM, double here, double thereM, double there, double level)
    {
        if (there >= level)
        {
            return thereM;
        }

        return here <= level ? hereM : hereM + ((thereM - hereM) * ((here - level) / (here - there)));
    }

    private void LookBetween(double fromM, double toM, ref Seen seen)
    {
        if (!(fromM <= toM))
        {
            return;
        }

        var x = line.XM;
        var offsetsM = train.OffsetsM;
        for (var i = 0; i < offsetsM.Length; i++)
        {
            var offsetM = direction == TravelDirection.Forward ? offsetsM[i] : -offsetsM[i];
            for (var k = FirstNotBelow(x, fromM - offsetM - WidenM); k < x.Length && x[k] + offsetM <= toM; k++)
            {
                Look(x[k] + offsetM, ref seen);
            }
        }
    }

    private void Look(double leadM, ref Seen seen)
    {
        Look(new TrainPosition(leadM, direction, Side.Before), ref seen);

        // Without a jump both sides have the same bits, and the tie rule takes the side below.
        if (line.AnyJump)
        {
            Look(new TrainPosition(leadM, direction, Side.After), ref seen);
        }
    }

    private void Look(TrainPosition p, ref Seen seen)
    {
        if (seen.First is { } first && !TieRule.Precedes(p, first))
        {
            return;
        }

        var response = _sign * Response.At(line, train, p, sense, rule);
        seen.Best = Math.Max(seen.Best, response);
        if (response >= seen.Least)
        {
            seen.First = p;
        }
    }

    private static int FirstNotBelow(ReadOnlySpan<double> x, double xM)
    {
        int low = 0, high = x.Length;
        while (low < high)
        {
            var middle = (low + high) >> 1;
            if (x[middle] < xM)
            {
                low = middle + 1;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }

    private struct Seen
    {
        internal double Best;
        internal double Least;
        internal TrainPosition? First;
    }
}
