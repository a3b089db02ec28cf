using System.Collections.Concurrent;

namespace PermitScreen.Service.Tests.Currency;

/// <summary>Which structures are strong at each catalogue version, by the acknowledgements of those who wrote.</summary>
internal sealed class VersionLog(long first, int structures)
{
    private readonly ConcurrentDictionary<long, (int Structure, bool Strong)> _changes = new();

    /// <summary>Versions written.</summary>
    public int Count => _changes.Count;

    /// <summary>A version made one structure strong or weak.</summary>
    public void Add(long version, int structure, bool strong) => Assert.True(_changes.TryAdd(version, (structure, strong)), $"Version {version} was acknowledged twice.");

    /// <summary>The structures at each version, from the first on; versions must follow each other without a gap.</summary>
    public IReadOnlyList<bool[]> Replay()
    {
        var states = new List<bool[]> { Enumerable.Repeat(true, structures).ToArray() };
        for (var version = first + 1; version <= first + _changes.Count; version++)
        {
            var (structure, strong) = _changes[version];
            var next = (bool[])states[^1].Clone();
            next[structure] = strong;
            states.Add(next);
        }

        return states;
    }
}
