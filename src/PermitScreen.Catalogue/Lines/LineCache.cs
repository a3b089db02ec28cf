using System.Collections.Concurrent;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>Keeps the lines of every truss that was solved, by content: structures of one design share them. Thread-safe.</summary>
public sealed class LineCache
{
    private readonly ConcurrentDictionary<string, TrussLines> _known = new(StringComparer.Ordinal);

    /// <summary>Number of trusses kept.</summary>
    public int Count => _known.Count;

    /// <summary>The lines of a truss, solved where they are not known yet; null with faults where it is a mechanism or cannot be solved accurately.</summary>
    /// <param name="model">Truss.</param>
    /// <param name="faults">Takes what is wrong.</param>
    public TrussLines? GetOrSolve(TrussModel model, FaultList faults)
    {
        var key = TrussKey.Of(model);
        if (_known.TryGetValue(key, out var known))
        {
            return known;
        }

        return TrussLines.TrySolve(model, faults) is { } solved ? _known.GetOrAdd(key, solved) : null;
    }
}
