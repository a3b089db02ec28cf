using System.Diagnostics;

namespace PermitScreen.Mechanics.Lines;

/// <summary>A piecewise straight influence line: the effect of a unit load as a function of the load's chainage.</summary>
/// <remarks>
/// The line is given by breakpoints, each with its ordinate just below and just above it; it is straight between breakpoints and zero
/// outside [<see cref="StartM"/>, <see cref="EndM"/>]. Every zero crossing is a breakpoint, so that each stretch has one sign.
/// Ordinates are effect per kN of load downwards (kN/kN, kN·m/kN). Immutable; at least two breakpoints.
/// </remarks>
public sealed partial class InfluenceLine
{
    /// <summary>Distance, m, within which a chainage counts as standing at a jump.</summary>
    /// <remarks>A position "axle at the breakpoint" is a sum and difference of chainages; rounding must not carry the axle over the jump.
    /// A nanometre is far above that rounding and far below anything that can be measured on a road.</remarks>
    public const double SnapM = 1e-9;

    private readonly double[] _xM;
    private readonly double[] _left;
    private readonly double[] _right;

    private InfluenceLine(double[] xM, double[] left, double[] right, double maxAbsSlope)
    {
        _xM = xM;
        _left = left;
        _right = right;
        MaxAbsSlope = maxAbsSlope;
        foreach (var ordinate in left)
        {
            Note(ordinate);
        }

        foreach (var ordinate in right)
        {
            Note(ordinate);
        }

        AnyJump = !left.AsSpan().SequenceEqual(right);
        (PositiveArea, NegativeArea) = Areas(xM, left, right);

        void Note(double ordinate)
        {
            HasPositive |= ordinate > 0;
            HasNegative |= ordinate < 0;
            MaxAbs = Math.Max(MaxAbs, Math.Abs(ordinate));
        }
    }

    /// <summary>Breakpoints, m; length <see cref="Count"/>, strictly increasing, zero crossings included.</summary>
    public ReadOnlySpan<double> XM => _xM;

    /// <summary>Ordinates just below each breakpoint; length <see cref="Count"/>, the first is 0.</summary>
    public ReadOnlySpan<double> LeftOrdinates => _left;

    /// <summary>Ordinates just above each breakpoint; length <see cref="Count"/>, the last is 0.</summary>
    public ReadOnlySpan<double> RightOrdinates => _right;

    /// <summary>Number of breakpoints, ≥ 2.</summary>
    public int Count => _xM.Length;

    /// <summary>First breakpoint, m; the line is zero below it.</summary>
    public double StartM => _xM[0];

    /// <summary>Last breakpoint, m; the line is zero above it.</summary>
    public double EndM => _xM[^1];

    /// <summary>Area of the positive parts, ordinate × m; ≥ 0.</summary>
    public double PositiveArea { get; }

    /// <summary>Area of the negative parts, ordinate × m; ≤ 0.</summary>
    public double NegativeArea { get; }

    /// <summary>Whether some ordinate is above zero.</summary>
    public bool HasPositive { get; private set; }

    /// <summary>Whether some ordinate is below zero.</summary>
    public bool HasNegative { get; private set; }

    /// <summary>Largest absolute ordinate; 0 for a line that is zero throughout.</summary>
    public double MaxAbs { get; private set; }

    /// <summary>Largest absolute slope of a stretch, ordinate per m; jumps do not count.</summary>
    public double MaxAbsSlope { get; }

    /// <summary>The line's one-sided ordinate at a chainage.</summary>
    /// <param name="xM">Chainage of the unit load, m; finite.</param>
    /// <param name="side">The limit meant where the line jumps; without effect elsewhere.</param>
    /// <returns>Effect per kN. Within <see cref="SnapM"/> of a breakpoint at which the line jumps, the ordinate on the given side of that breakpoint.</returns>
    public double At(double xM, Side side)
    {
        Debug.Assert(double.IsFinite(xM), "chainage must be finite");
        var x = _xM;
        if (xM < x[0])
        {
            return x[0] - xM <= SnapM && side == Side.After && Jumps(0) ? _right[0] : 0;
        }

        if (xM > x[^1])
        {
            return xM - x[^1] <= SnapM && side == Side.Before && Jumps(x.Length - 1) ? _left[^1] : 0;
        }

        var k = LastAtOrBelow(x, xM);
        if (xM - x[k] <= SnapM && (xM == x[k] || Jumps(k)))
        {
            return side == Side.Before ? _left[k] : _right[k];
        }

        if (x[k + 1] - xM <= SnapM && Jumps(k + 1))
        {
            return side == Side.Before ? _left[k + 1] : _right[k + 1];
        }

        return _right[k] + ((_left[k + 1] - _right[k]) * ((xM - x[k]) / (x[k + 1] - x[k])));
    }

    /// <summary>Whether the line jumps anywhere.</summary>
    internal bool AnyJump { get; }

    /// <summary>Whether the line jumps at a breakpoint.</summary>
    internal bool Jumps(int k) => _left[k] != _right[k];

    private static int LastAtOrBelow(double[] x, double xM)
    {
        int low = 0, high = x.Length;
        while (high - low > 1)
        {
            var middle = (low + high) >> 1;
            if (x[middle] <= xM)
            {
                low = middle;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }

    private static (double Positive, double Negative) Areas(double[] x, double[] left, double[] right)
    {
        double positive = 0, negative = 0;
        for (var k = 0; k + 1 < x.Length; k++)
        {
            // One sign per stretch: zero crossings are breakpoints.
            var area = (right[k] + left[k + 1]) / 2 * (x[k + 1] - x[k]);
            positive += Math.Max(area, 0);
            negative += Math.Min(area, 0);
        }

        return (positive, negative);
    }
}
