using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Rating.Ladder;

/// <summary>The live-load factor of a vehicle on a deck, after its weight over length (rule B2).</summary>
public sealed class LiveLoadFactors
{
    private readonly LiveLoadRow _row;
    private readonly double? _adtt;
    private readonly ImmutableArray<AxleGroup> _groups;
    private readonly int _axles;

    /// <summary>Prepares the groups of a vehicle.</summary>
    /// <param name="row">Row of the policy.</param>
    /// <param name="adtt">Trucks a day in one direction; null where unknown.</param>
    /// <param name="train">Vehicle.</param>
    /// <param name="deckLengthM">Length of the deck, m: a longer group never stands on it as a whole.</param>
    public LiveLoadFactors(LiveLoadRow row, double? adtt, AxleTrain train, double deckLengthM)
    {
        _row = row;
        _adtt = adtt;
        _axles = train.Count;
        var groups = ImmutableArray.CreateBuilder<AxleGroup>();
        for (var first = 0; first < train.Count; first++)
        {
            var weight = train.LoadsKn[first];
            for (var last = first + 1; last < train.Count; last++)
            {
                weight += train.LoadsKn[last];
                var length = train.OffsetsM[last] - train.OffsetsM[first];
                var whole = first == 0 && last == train.Count - 1;
                if (length > 0 && (length <= deckLengthM || whole))
                {
                    groups.Add(new AxleGroup(first + 1, last + 1, weight / length));
                }
            }
        }

        _groups = groups.ToImmutable();
    }

    /// <summary>The factor with all axle loads multiplied by k, and the group that gives it.</summary>
    /// <param name="k">Factor on the axle loads, &gt; 0.</param>
    public (double Factor, string Note) At(double k)
    {
        var (factor, group) = Governing(k);
        if (_row.Classes.Length == 1)
        {
            return (factor, "one factor for all weights");
        }

        if (group is not { } g)
        {
            return (factor, "no length between axles: the largest factor of the row");
        }

        var what = g.FirstAxle == 1 && g.LastAxle == _axles ? "whole vehicle" : FormattableString.Invariant($"axles {g.FirstAxle} to {g.LastAxle}");
        return (factor, FormattableString.Invariant($"{what}, {k * g.KnPerM:0.00} kN/m"));
    }

    /// <summary>The factors k, ascending, at which a group passes from one class into the next: the factor is constant on (previous, this].</summary>
    public ImmutableArray<double> ClassBoundaries() =>
        [.. _groups
            .SelectMany(g => _row.Classes[..^1].Select(c => c.UpToKnPerM / g.KnPerM))
            .Distinct()
            .Order()];

    private (double Factor, AxleGroup? Group) Governing(double k)
    {
        if (_groups.IsEmpty)
        {
            return (Enumerable.Range(0, _row.Classes.Length).Max(c => _row.FactorOf(c, _adtt)), null);
        }

        (double Factor, AxleGroup? Group) best = (double.NegativeInfinity, null);
        foreach (var group in WholeVehicleFirst())
        {
            var factor = _row.FactorOf(_row.ClassOf(k * group.KnPerM), _adtt);
            if (factor > best.Factor)
            {
                best = (factor, group);
            }
        }

        return best;
    }

    private IEnumerable<AxleGroup> WholeVehicleFirst() =>
        _groups.OrderByDescending(g => g.LastAxle - g.FirstAxle).ThenBy(g => g.FirstAxle);
}
