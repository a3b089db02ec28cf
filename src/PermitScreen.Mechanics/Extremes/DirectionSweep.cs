using System.Buffers;
using System.Numerics;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>One pass of a train over a line in one direction: the approximate response at every event at which it bends or jumps.</summary>
/// <remarks>The default value is a pass without events.</remarks>
internal ref struct DirectionSweep
{
    /// <summary>Half the spacing of doubles at 1: the largest relative rounding of one operation.</summary>
    private const double Unit = 1.1102230246251565e-16;

    private readonly double[] _rented;
    private readonly int[] _rentedIds;
    private readonly int _count;
    private bool _swapped;

    private DirectionSweep(int count)
    {
        _count = count;
        _rented = ArrayPool<double>.Shared.Rent(6 * count);
        _rentedIds = ArrayPool<int>.Shared.Rent(2 * count);
    }

    /// <summary>Lead chainage of each event, m, not decreasing.</summary>
    internal readonly ReadOnlySpan<double> LeadsM => _rented.AsSpan(_swapped ? _count : 0, _count);

    /// <summary>Response just before each event, kN or kN·m, within <see cref="Error"/>.</summary>
    internal readonly ReadOnlySpan<double> Before => _rented.AsSpan(4 * _count, _count);

    /// <summary>Response just after each event.</summary>
    internal readonly ReadOnlySpan<double> After => _rented.AsSpan(5 * _count, _count);

    private readonly Span<double> Responses => _rented.AsSpan(4 * _count, 2 * _count);

    /// <summary>Largest response of the pass.</summary>
    internal double Top { get; private set; }

    /// <summary>Bound of the difference between a response here and <see cref="Response.At"/> there; NaN or infinite where the sum overflowed.</summary>
    internal double Error { get; private set; }

    /// <summary>Whether this pass cannot be trusted: the running sum did not come back to zero when the train had left, or events lie so near the
    /// snapping distance of a jump that rounding decides on which side of it they are.</summary>
    internal bool Doubtful { get; private set; }

    internal static DirectionSweep Run(scoped in Bends bends, AxleTrain train, TravelDirection direction)
    {
        var sweep = new DirectionSweep(bends.Count * train.Count);
        var run = sweep.Lay(bends, train, direction);
        var all = sweep._rented.AsSpan();
        var ids = sweep._rentedIds.AsSpan();
        var n = sweep._count;
        sweep._swapped = EventOrder.Merge(all[..n], ids[..n], all.Slice(n, n), ids.Slice(n, n), run);
        sweep.Sum();
        sweep.Judge(bends, train);
        if (bends.AnyJump)
        {
            sweep.JoinJumps();
        }

        sweep.FindTop();
        return sweep;
    }

    /// <summary>Changes the sign of every response: the pass over the negated line, whose largest response is this one's smallest.</summary>
    internal void Negate()
    {
        foreach (ref var response in Responses)
        {
            response = -response;
        }

        FindTop();
    }

    internal readonly void Return()
    {
        // A direction not asked for is a default sweep: no events, nothing rented.
        if (_rented is not null)
        {
            ArrayPool<double>.Shared.Return(_rented);
            ArrayPool<int>.Shared.Return(_rentedIds);
        }
    }

    /// <summary>Lays out the events as runs in order of chainage, as few runs as can be: one per axle or one per bend.</summary>
    /// <returns>Length of a run.</returns>
    private readonly int Lay(scoped in Bends bends, AxleTrain train, TravelDirection direction)
    {
        var keys = _rented.AsSpan(0, _count);
        var slopes = _rented.AsSpan(2 * _count, _count);
        var jumps = _rented.AsSpan(3 * _count, _count);
        var loadsKn = train.LoadsKn;
        var offsetsM = train.OffsetsM;
        var x = bends.XM;
        var byAxle = train.Count <= bends.Count;
        for (var i = 0; i < loadsKn.Length; i++)
        {
            var forward = direction == TravelDirection.Forward;
            var axle = forward || byAxle ? i : loadsKn.Length - 1 - i;
            var offsetM = forward ? offsetsM[axle] : -offsetsM[axle];
            var weight = Math.Abs(loadsKn[axle]);
            var bend = bends.Slopes(loadsKn[axle] < 0);
            var jump = bends.Jumps(loadsKn[axle] < 0);
            var (at, step) = byAxle ? (i * x.Length, 1) : (i, loadsKn.Length);
            for (var k = 0; k < x.Length; k++, at += step)
            {
                keys[at] = x[k] + offsetM;
                slopes[at] = weight * bend[k];
                jumps[at] = weight * jump[k];
            }
        }

        for (var i = 0; i < _count; i++)
        {
            _rentedIds[i] = i;
        }

        return byAxle ? x.Length : loadsKn.Length;
    }

    private readonly void Sum()
    {
        var leads = LeadsM;
        var ids = _rentedIds.AsSpan(_swapped ? _count : 0, _count);
        var slopes = _rented.AsSpan(2 * _count, _count);
        var jumps = _rented.AsSpan(3 * _count, _count);
        var before = _rented.AsSpan(4 * _count, _count);
        var after = _rented.AsSpan(5 * _count, _count);
        double sum = 0, slope = 0, lastM = leads[0];
        for (var i = 0; i < leads.Length; i++)
        {
            sum += slope * (leads[i] - lastM);
            lastM = leads[i];
            before[i] = sum;
            sum += jumps[ids[i]];
            after[i] = sum;
            slope += slopes[ids[i]];
        }
    }

    /// <summary>Vectors pay here: the largest of many numbers does not depend on the order in which they are compared.</summary>
    private void FindTop()
    {
        var responses = Responses;
        var top = double.NegativeInfinity;
        var lanes = new Vector<double>(top);
        var i = 0;
        for (; i + Vector<double>.Count <= responses.Length; i += Vector<double>.Count)
        {
            lanes = Vector.Max(lanes, new Vector<double>(responses[i..]));
        }

        for (; i < responses.Length; i++)
        {
            top = Math.Max(top, responses[i]);
        }

        for (var lane = 0; lane < Vector<double>.Count; lane++)
        {
            top = Math.Max(top, lanes[lane]);
        }

        Top = top;
    }

    private void Judge(scoped in Bends bends, AxleTrain train)
    {
        var (first, last) = (LeadsM[0], LeadsM[^1]);
        var reachM = (last - first) + Math.Max(Math.Abs(first), Math.Abs(last)) + train.LengthM;
        var kn = train.SumAbsLoadsKn;

        // Each of the n steps adds a rounding of the slope (carried over the rest of the way), of an event's chainage (the slope acts there), of a jump
        // and of the sum; 4 covers the products and Response.At's own rounding.
        Error = (4 * Unit * (_count + 8) * kn * ((bends.SumOfBends * reachM) + bends.SumOfJumps + bends.MaxAbs)) + (kn * bends.Neglected);
        Doubtful = !(Math.Abs(After[^1]) <= Error);
        if (bends.AnyJump)
        {
            // Response.At takes an axle within SnapM of a jump as standing at it.
            Error += 4 * InfluenceLine.SnapM * kn * bends.SumOfBends;
        }
    }

    /// <summary>Within <see cref="InfluenceLine.SnapM"/> all jumps happen at once, as in <see cref="Response.At"/>: before means before the first of them,
    /// after means after the last.</summary>
    private void JoinJumps()
    {
        const double Surely = 0.5 * InfluenceLine.SnapM, SurelyNot = 1.5 * InfluenceLine.SnapM;
        var leads = LeadsM;
        var before = _rented.AsSpan(4 * _count, _count);
        var after = _rented.AsSpan(5 * _count, _count);

        // Backwards for 'before' and forwards for 'after', so that what is read has not been replaced yet.
        for (var i = leads.Length - 1; i > 0; i--)
        {
            for (var j = i - 1; j >= 0 && leads[i] - leads[j] < SurelyNot; j--)
            {
                Doubtful |= leads[i] - leads[j] > Surely;
                before[i] = before[j];
            }
        }

        for (var i = 0; i + 1 < leads.Length; i++)
        {
            for (var j = i + 1; j < leads.Length && leads[j] - leads[i] < SurelyNot; j++)
            {
                after[i] = after[j];
            }
        }
    }
}
