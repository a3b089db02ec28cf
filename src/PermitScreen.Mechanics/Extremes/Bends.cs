using System.Buffers;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>Where a line bends or jumps, and by how much, as one sense and one weighing rule see it.</summary>
/// <remarks>
/// A minimum is the maximum of the negated line. For a maximum an axle of weight w ≥ 0 counts with w·(1 + t) where the line is positive and with
/// w·(1 − t), or not at all, where it is negative: that is weight w on a line whose ordinates are scaled so; an axle of weight w &lt; 0 is weight |w| on
/// the negated line. Zero crossings are breakpoints, so the scaled lines are straight between the same breakpoints.
/// Breakpoints at which neither line bends are left out (most panel points of a determinate truss): what that neglects is in <see cref="Neglected"/>.
/// </remarks>
internal ref struct Bends
{
    /// <summary>A change of slope below this share of the steepest slope is rounding in the ordinates of a straight stretch.</summary>
    private const double Straight = 1e-12;

    private readonly double[] _rented;
    private readonly int _capacity;

    private Bends(int capacity)
    {
        _capacity = capacity;
        _rented = ArrayPool<double>.Shared.Rent(5 * capacity);
    }

    /// <summary>Number of breakpoints kept.</summary>
    internal int Count { get; private set; }

    /// <summary>Chainage of each bend, m, increasing.</summary>
    internal readonly Span<double> XM => _rented.AsSpan(0, Count);

    /// <summary>Change of slope at each bend as an axle of this sign sees it, to be multiplied by |w|. For a negative axle filled only where the train has one.</summary>
    internal readonly ReadOnlySpan<double> Slopes(bool negativeAxle) => _rented.AsSpan((negativeAxle ? 3 : 1) * _capacity, Count);

    /// <summary>Size of jump at each bend, in the same way.</summary>
    internal readonly ReadOnlySpan<double> Jumps(bool negativeAxle) => _rented.AsSpan((negativeAxle ? 4 : 2) * _capacity, Count);

    /// <summary>Whether the line jumps anywhere.</summary>
    internal bool AnyJump { get; private set; }

    /// <summary>Sum of all absolute changes of slope, per m; not below the steepest slope.</summary>
    internal double SumOfBends { get; private set; }

    /// <summary>Sum of all absolute jumps.</summary>
    internal double SumOfJumps { get; private set; }

    /// <summary>Largest absolute ordinate.</summary>
    internal double MaxAbs { get; private set; }

    /// <summary>Bound of the difference between the line and the line without the breakpoints left out.</summary>
    internal double Neglected { get; private set; }

    internal static Bends Of(InfluenceLine line, Sense sense, WeighingRule rule, bool forNegative)
    {
        var bends = new Bends(line.Count);
        bends.Fill(line, new Scale(sense == Sense.Max ? 1 : -1, rule), new Scale(sense == Sense.Max ? -1 : 1, rule), forNegative);
        return bends;
    }

    internal readonly void Return() => ArrayPool<double>.Shared.Return(_rented);

    private void Fill(InfluenceLine line, Scale up, Scale down, bool forNegative)
    {
        var x = line.XM;
        var left = line.LeftOrdinates;
        var right = line.RightOrdinates;
        var heaviest = Math.Max(Math.Abs(up.Positive), Math.Abs(up.Negative));
        var straight = Straight * heaviest * line.MaxAbsSlope;
        double slopeUp = 0, slopeDown = 0, neglectedSlope = 0;
        for (var k = 0; k < x.Length; k++)
        {
            double nextUp = 0, nextDown = 0;
            if (k + 1 < x.Length)
            {
                var widthM = x[k + 1] - x[k];
                nextUp = (up.Of(left[k + 1]) - up.Of(right[k])) / widthM;
                nextDown = forNegative ? (down.Of(left[k + 1]) - down.Of(right[k])) / widthM : 0;
            }

            var (bendUp, bendDown) = (nextUp - slopeUp, nextDown - slopeDown);
            var bend = Math.Max(Math.Abs(bendUp), Math.Abs(bendDown));
            (slopeUp, slopeDown) = (nextUp, nextDown);
            if (left[k] == right[k] && bend <= straight)
            {
                neglectedSlope += bend;
                continue;
            }

            Add(x[k], bendUp, up.Of(right[k]) - up.Of(left[k]), bendDown, forNegative ? down.Of(right[k]) - down.Of(left[k]) : 0);
        }

        MaxAbs = heaviest * line.MaxAbs;
        Neglected = neglectedSlope * (line.EndM - line.StartM);
    }

    private void Add(double xM, double bendUp, double jumpUp, double bendDown, double jumpDown)
    {
        var all = _rented.AsSpan();
        all[Count] = xM;
        all[_capacity + Count] = bendUp;
        all[(2 * _capacity) + Count] = jumpUp;
        all[(3 * _capacity) + Count] = bendDown;
        all[(4 * _capacity) + Count] = jumpDown;
        Count++;
        AnyJump |= jumpUp != 0 || jumpDown != 0;
        SumOfBends += Math.Max(Math.Abs(bendUp), Math.Abs(bendDown));
        SumOfJumps += Math.Max(Math.Abs(jumpUp), Math.Abs(jumpDown));
    }

    /// <summary>Factors by which a rule scales positive and negative ordinates.</summary>
    private readonly struct Scale(double sign, WeighingRule rule)
    {
        internal double Positive { get; } = 1 + Math.Abs(rule.Tolerance);

        internal double Negative { get; } = rule.RelievingAxlesCount ? 1 - Math.Abs(rule.Tolerance) : 0;

        internal double Of(double ordinate)
        {
            var signed = sign * ordinate;
            return signed * (signed > 0 ? Positive : Negative);
        }
    }
}
