using System.Runtime.CompilerServices;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Rating.Ladder;

/// <summary>Finds extremes of lines under trains and keeps them, since planes and rungs share lines and vehicles. One screening, one thread.</summary>
/// <param name="plain">Whether the plain path is used, for decisions within rounding of 1 (rule B8).</param>
public sealed class LineExtremes(bool plain = false)
{
    private readonly Dictionary<Key, Extreme> _known = [];

    /// <summary>The extreme in one sense, the empty bridge included.</summary>
    /// <param name="line">Influence line.</param>
    /// <param name="train">Train; compared by reference.</param>
    /// <param name="sense">Which end of the range.</param>
    /// <param name="directions">Directions of travel.</param>
    /// <param name="rule">How axle weights are trusted.</param>
    public Extreme Of(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule)
    {
        var key = new Key(line, train, sense, directions, rule);
        if (!_known.TryGetValue(key, out var extreme))
        {
            extreme = Find(line, train, sense, directions, rule);
            _known.Add(key, extreme);
        }

        return extreme;
    }

    /// <summary>The same, not kept: for a train that nothing else asks for.</summary>
    /// <param name="line">Influence line.</param>
    /// <param name="train">Train.</param>
    /// <param name="sense">Which end of the range.</param>
    /// <param name="directions">Directions of travel.</param>
    /// <param name="rule">How axle weights are trusted.</param>
    public Extreme Find(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule) => plain
        ? PlainExtremes.Of(line, train, sense, directions, rule)
        : SweepExtremes.Of(line, train, sense, directions, rule);

    private readonly struct Key(InfluenceLine line, AxleTrain train, Sense sense, TravelDirections directions, WeighingRule rule) : IEquatable<Key>
    {
        private readonly InfluenceLine _line = line;
        private readonly AxleTrain _train = train;
        private readonly Sense _sense = sense;
        private readonly TravelDirections _directions = directions;
        private readonly WeighingRule _rule = rule;

        public bool Equals(Key other) =>
            ReferenceEquals(_line, other._line) && ReferenceEquals(_train, other._train)
            && _sense == other._sense && _directions == other._directions && _rule == other._rule;

        public override bool Equals(object? obj) => obj is Key other && Equals(other);

        public override int GetHashCode() =>
            HashCode.Combine(RuntimeHelpers.GetHashCode(_line), RuntimeHelpers.GetHashCode(_train), _sense, _directions);
    }
}
