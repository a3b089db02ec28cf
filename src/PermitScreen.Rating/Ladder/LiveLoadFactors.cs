using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Rating.Ladder;

/// <summary>The live-load factor of a vehicle on a structure, after its weight over length (rule B2).</summary>
/// <remarks>
/// Factors never rise with weight over length (a policy is refused otherwise), so the group of least weight over length has the
/// largest factor at every k.
/// </remarks>
public sealed class LiveLoadFactors
{
    private readonly LiveLoadRow _row;
    private readonly double? _adtt;
    private readonly AxleGroup? _least;
    private readonly int _axles;

    /// <summary>Finds the governing group of a vehicle.</summary>
    /// <param name="row">Row of the policy.</param>
    /// <param name="adtt">Trucks a day in one direction; null where unknown.</param>
    /// <param name="train">Vehicle.</param>
    /// <param name="lengthM">Length of the structure's deck, m: a longer group never stands on it as a whole.</param>
    public LiveLoadFactors(LiveLoadRow row, double? adtt, AxleTrain train, double lengthM)
    {
        _row = row;
        _adtt = adtt;
        _axles = train.Count;
        _least = LeastGroup(train, lengthM);
    }

    /// <summary>The factor with all axle loads multiplied by k, and the group that gives it.</summary>
    /// <param name="k">Factor on the axle loads, &gt; 0.</param>
    public (double Factor, string Note) At(double k)
    {
        if (_least is not { } group)
        {
            return (Enumerable.Range(0, _row.Classes.Length).Max(c => _row.FactorOf(c, _adtt)), "no length between axles: the largest factor of the row");
        }

        var factor = _row.FactorOf(_row.ClassOf(k * group.KnPerM), _adtt);
        if (_row.Classes.Length == 1)
        {
            return (factor, "one factor for all weights");
        }

        var what = group.FirstAxle == 1 && group.LastAxle == _axles ? "whole vehicle" : FormattableString.Invariant($"axles {group.FirstAxle} to {group.LastAxle}");
        return (factor, FormattableString.Invariant($"{what}, {k * group.KnPerM:0.00} kN/m"));
    }

    /// <summary>The factors k, ascending, at which the group passes from one class into the next: the factor is constant on (previous, this].</summary>
    public ImmutableArray<double> ClassBoundaries() =>
        _least is { } group ? [.. _row.Classes[..^1].Select(c => c.UpToKnPerM / group.KnPerM)] : [];

    /// <summary>The whole vehicle, or the run of axles that can be on the structure together, with the least weight over length; the longest of equal ones.</summary>
    private static AxleGroup? LeastGroup(AxleTrain train, double lengthM)
    {
        AxleGroup? least = null;
        for (var axles = train.Count; axles >= 2; axles--)
        {
            for (var first = 0; first + axles <= train.Count; first++)
            {
                var last = first + axles - 1;
                var length = train.OffsetsM[last] - train.OffsetsM[first];
                if (length <= 0 || (length > lengthM && axles < train.Count))
                {
                    continue;
                }

                var weight = 0.0;
                for (var i = first; i <= last; i++)
                {
                    weight += train.LoadsKn[i];
                }

                if (least is not { } known || weight / length < known.KnPerM)
                {
                    least = new AxleGroup(first + 1, last + 1, weight / length);
                }
            }
        }

        return least;
    }
}
