using System.Globalization;

namespace PermitScreen.Mechanics.Lines;

public sealed partial class InfluenceLine
{
    /// <summary>Makes a continuous line from one ordinate per breakpoint; it jumps to zero at its ends where they are not zero.</summary>
    /// <param name="xM">Breakpoints, m; length n ≥ 2, finite, strictly increasing.</param>
    /// <param name="ordinates">Ordinate at each breakpoint, effect per kN; length n, finite.</param>
    /// <exception cref="ArgumentException">The lengths differ, fewer than two points, a number is not finite, or the breakpoints do not increase.</exception>
    public static InfluenceLine FromPoints(ReadOnlySpan<double> xM, ReadOnlySpan<double> ordinates)
    {
        var left = ordinates.ToArray();
        var right = ordinates.ToArray();
        if (left.Length > 0)
        {
            left[0] = 0;
            right[^1] = 0;
        }

        return FromPoints(xM, left, right);
    }

    /// <summary>Makes a line from two one-sided ordinates per breakpoint and inserts its zero crossings as breakpoints.</summary>
    /// <param name="xM">Breakpoints, m; length n ≥ 2, finite, strictly increasing.</param>
    /// <param name="leftOrdinates">Ordinate just below each breakpoint, effect per kN; length n, finite, the first 0.</param>
    /// <param name="rightOrdinates">Ordinate just above each breakpoint, effect per kN; length n, finite, the last 0.</param>
    /// <exception cref="ArgumentException">The lengths differ, fewer than two points, a number is not finite, the breakpoints do not increase,
    /// or the line is not zero outside its ends.</exception>
    public static InfluenceLine FromPoints(ReadOnlySpan<double> xM, ReadOnlySpan<double> leftOrdinates, ReadOnlySpan<double> rightOrdinates)
    {
        Check(xM, leftOrdinates, rightOrdinates);
        var x = new List<double>(xM.Length + 4);
        var left = new List<double>(xM.Length + 4);
        var right = new List<double>(xM.Length + 4);
        var maxAbsSlope = 0.0;
        for (var k = 0; k < xM.Length; k++)
        {
            if (k > 0)
            {
                var (y0, y1, dx) = (right[^1], leftOrdinates[k], xM[k] - xM[k - 1]);

                // Of the given stretch, before a crossing splits it: a sliver's own slope is mostly rounding.
                maxAbsSlope = Math.Max(maxAbsSlope, Math.Abs((y1 - y0) / dx));
                if ((y0 < 0 && y1 > 0) || (y0 > 0 && y1 < 0))
                {
                    InsertCrossing(xM[k - 1] + (dx * (y0 / (y0 - y1))), xM[k]);
                }
            }

            x.Add(xM[k]);
            left.Add(leftOrdinates[k]);
            right.Add(rightOrdinates[k]);
        }

        return new InfluenceLine([.. x], [.. left], [.. right], maxAbsSlope);

        void InsertCrossing(double crossingM, double nextM)
        {
            if (crossingM > x[^1] && crossingM < nextM)
            {
                x.Add(crossingM);
                left.Add(0);
                right.Add(0);
            }
        }
    }

    /// <summary>The line moved along the structure.</summary>
    /// <param name="m">Distance, m, positive towards higher chainage; finite.</param>
    /// <exception cref="ArgumentException">The distance is not finite, or so large that breakpoints would fall together.</exception>
    public InfluenceLine ShiftedBy(double m)
    {
        var x = new List<double>(Count);
        var left = new List<double>(Count);
        var right = new List<double>(Count);
        for (var k = 0; k < Count; k++)
        {
            var moved = _xM[k] + m;
            if (x.Count > 0 && moved <= x[^1])
            {
                // Points a rounding apart (a zero crossing beside a breakpoint) may meet: keep both outer limits.
                right[^1] = _right[k];
                continue;
            }

            x.Add(moved);
            left.Add(_left[k]);
            right.Add(_right[k]);
        }

        var (xM, l, r) = (x.ToArray(), left.ToArray(), right.ToArray());
        Check(xM, l, r);
        return new InfluenceLine(xM, l, r, MaxAbsSlope);
    }

    /// <summary>The line with every ordinate's sign changed.</summary>
    public InfluenceLine Negated() => new([.. _xM], Array.ConvertAll(_left, y => -y), Array.ConvertAll(_right, y => -y), MaxAbsSlope);

    /// <summary>The linear combination Σ factor × line, with the breakpoints of all lines.</summary>
    /// <param name="factors">Factor of each line; length n ≥ 1, finite.</param>
    /// <param name="lines">Lines; length n. They may differ in extent.</param>
    /// <returns>The combined line. Breakpoints within <see cref="SnapM"/> of each other become one.</returns>
    /// <exception cref="ArgumentException">No line, lengths differ, or a factor (or a sum) is not finite.</exception>
    public static InfluenceLine Combine(ReadOnlySpan<double> factors, IReadOnlyList<InfluenceLine> lines)
    {
        if (lines.Count == 0 || factors.Length != lines.Count)
        {
            throw new ArgumentException($"one factor per line is needed; found {factors.Length} factors and {lines.Count} lines", nameof(factors));
        }

        var all = lines.SelectMany(line => line._xM).Distinct().Order().ToArray();
        List<double> x = [], left = [], right = [];
        for (var first = 0; first < all.Length;)
        {
            var last = first;
            while (last + 1 < all.Length && all[last + 1] - all[first] <= SnapM)
            {
                last++;
            }

            x.Add(all[first]);
            left.Add(first == 0 ? 0 : SumAt(factors, lines, all[first], Side.Before));
            right.Add(last == all.Length - 1 ? 0 : SumAt(factors, lines, all[last], Side.After));
            first = last + 1;
        }

        return FromPoints([.. x], [.. left], [.. right]);
    }

    private static double SumAt(ReadOnlySpan<double> factors, IReadOnlyList<InfluenceLine> lines, double xM, Side side)
    {
        var sum = 0.0;
        for (var i = 0; i < lines.Count; i++)
        {
            sum += factors[i] * lines[i].At(xM, side);
        }

        return sum;
    }

    /// <summary>A line from the numbers that an earlier one had, to the bit; unlike <see cref="FromPoints(ReadOnlySpan{double}, ReadOnlySpan{double}, ReadOnlySpan{double})"/> it inserts nothing.</summary>
    /// <param name="xM">Breakpoints, m, as in <see cref="XM"/>.</param>
    /// <param name="leftOrdinates">Ordinates just below each breakpoint, as in <see cref="LeftOrdinates"/>.</param>
    /// <param name="rightOrdinates">Ordinates just above each breakpoint, as in <see cref="RightOrdinates"/>.</param>
    /// <param name="maxAbsSlope">As in <see cref="MaxAbsSlope"/>.</param>
    /// <returns>The line; <see langword="null"/> where the numbers cannot be those of a line.</returns>
    public static InfluenceLine? TryRestore(
        ReadOnlySpan<double> xM, ReadOnlySpan<double> leftOrdinates, ReadOnlySpan<double> rightOrdinates, double maxAbsSlope) =>
        Problem(xM, leftOrdinates, rightOrdinates) is null && double.IsFinite(maxAbsSlope) && maxAbsSlope >= 0
            ? new InfluenceLine(xM.ToArray(), leftOrdinates.ToArray(), rightOrdinates.ToArray(), maxAbsSlope)
            : null;

    private static void Check(ReadOnlySpan<double> xM, ReadOnlySpan<double> left, ReadOnlySpan<double> right)
    {
        if (Problem(xM, left, right) is { } problem)
        {
            throw new ArgumentException(problem, nameof(xM));
        }
    }

    private static string? Problem(ReadOnlySpan<double> xM, ReadOnlySpan<double> left, ReadOnlySpan<double> right)
    {
        if (xM.Length < 2 || left.Length != xM.Length || right.Length != xM.Length)
        {
            return string.Create(
                CultureInfo.InvariantCulture,
                $"a line needs two points or more and as many ordinates; found {xM.Length} points, {left.Length} left and {right.Length} right ordinates");
        }

        for (var k = 0; k < xM.Length; k++)
        {
            if (!double.IsFinite(xM[k]) || !double.IsFinite(left[k]) || !double.IsFinite(right[k]))
            {
                return string.Create(CultureInfo.InvariantCulture, $"point {k} of a line is not finite");
            }

            if (k > 0 && !(xM[k] > xM[k - 1]))
            {
                return string.Create(CultureInfo.InvariantCulture, $"breakpoints must increase; point {k} does not");
            }
        }

        return left[0] != 0 || right[^1] != 0 ? "a line is zero outside: its first left and last right ordinate must be 0" : null;
    }
}
