using System.Numerics;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Extremes by brute force: the lead axle at every millimetre of the whole passage, in a direction.</summary>
/// <remarks>
/// Shares no code with the product: each stretch of the line is added to the grid for each axle. Where the line jumps, both sides are kept at grid points, and
/// the positions "an axle at a jump" are looked at too, on both sides: without them the limit beside a jump would be up to 1 mm away and not ½ mm.
/// </remarks>
internal sealed class MillimetreScan
{
    internal const double StepM = 1e-3;

    private double[] _before = [];
    private double[] _after = [];

    /// <summary>Largest and smallest response; the empty structure counts.</summary>
    internal (double Max, double Min) Over(InfluenceLine line, AxleTrain train, TravelDirection direction)
    {
        var offsetsM = train.OffsetsM.ToArray().Select(d => direction == TravelDirection.Forward ? d : -d).ToArray();
        var originM = line.StartM + offsetsM.Min() - StepM;
        var count = (int)((line.EndM + offsetsM.Max() - originM) / StepM) + 3;
        if (_before.Length < count)
        {
            (_before, _after) = (new double[count], new double[count]);
        }

        var jumps = JumpsOf(line);
        var (max, min) = Sweep(line, train, offsetsM, originM, _before.AsSpan(0, count), -1e-6);
        if (jumps.Length > 0)
        {
            var other = Sweep(line, train, offsetsM, originM, _after.AsSpan(0, count), 1e-6);
            (max, min) = (Math.Max(max, other.Max), Math.Min(min, other.Min));
        }

        foreach (var leadM in jumps.SelectMany(x => offsetsM.Select(d => x + d)))
        {
            foreach (var side in (Side[])[Side.Before, Side.After])
            {
                var response = Naive.Response(line, train, new TrainPosition(leadM, direction, side));
                (max, min) = (Math.Max(max, response), Math.Min(min, response));
            }
        }

        return (Math.Max(max, 0), Math.Min(min, 0));
    }

    private static double[] JumpsOf(InfluenceLine line)
    {
        List<double> jumps = [];
        for (var k = 0; k < line.Count; k++)
        {
            if (line.LeftOrdinates[k] != line.RightOrdinates[k])
            {
                jumps.Add(line.XM[k]);
            }
        }

        return [.. jumps];
    }

    /// <param name="line">Influence line.</param>
    /// <param name="train">Vehicle.</param>
    /// <param name="offsetsM">Signed offsets: axle i stands at lead − offset.</param>
    /// <param name="originM">Lead chainage of grid point 0.</param>
    /// <param name="grid">Responses.</param>
    /// <param name="shift">In steps: slightly below zero, a grid point at a breakpoint belongs to the stretch before it; slightly above, to the one after.</param>
    private static (double Max, double Min) Sweep(InfluenceLine line, AxleTrain train, double[] offsetsM, double originM, Span<double> grid, double shift)
    {
        grid.Clear();
        for (var i = 0; i < offsetsM.Length; i++)
        {
            for (var k = 0; k + 1 < line.Count; k++)
            {
                var (startM, endM) = (line.XM[k] + offsetsM[i], line.XM[k + 1] + offsetsM[i]);
                var from = (int)Math.Ceiling(((startM - originM) / StepM) - shift);
                var to = (int)Math.Ceiling(((endM - originM) / StepM) - shift);
                var slope = (line.LeftOrdinates[k + 1] - line.RightOrdinates[k]) / (endM - startM);
                var first = line.RightOrdinates[k] + (slope * (originM + (from * StepM) - startM));
                AddStraight(grid[from..to], train.LoadsKn[i] * first, train.LoadsKn[i] * slope * StepM);
            }
        }

        return Ends(grid);
    }

    private static void AddStraight(Span<double> grid, double first, double step)
    {
        var lanes = Vector<double>.Count;
        var ramp = Vector<double>.Zero;
        for (var lane = 0; lane < lanes; lane++)
        {
            ramp = ramp.WithElement(lane, lane * step);
        }

        var g = 0;
        for (; g + lanes <= grid.Length; g += lanes)
        {
            var at = grid.Slice(g, lanes);
            (new Vector<double>(at) + new Vector<double>(first + (g * step)) + ramp).CopyTo(at);
        }

        for (; g < grid.Length; g++)
        {
            grid[g] += first + (g * step);
        }
    }

    private static (double Max, double Min) Ends(ReadOnlySpan<double> grid)
    {
        var (max, min) = (Vector<double>.Zero, Vector<double>.Zero);
        var g = 0;
        for (; g + Vector<double>.Count <= grid.Length; g += Vector<double>.Count)
        {
            var at = new Vector<double>(grid[g..]);
            (max, min) = (Vector.Max(max, at), Vector.Min(min, at));
        }

        double largest = 0, smallest = 0;
        for (var lane = 0; lane < Vector<double>.Count; lane++)
        {
            (largest, smallest) = (Math.Max(largest, max[lane]), Math.Min(smallest, min[lane]));
        }

        for (; g < grid.Length; g++)
        {
            (largest, smallest) = (Math.Max(largest, grid[g]), Math.Min(smallest, grid[g]));
        }

        return (largest, smallest);
    }
}
