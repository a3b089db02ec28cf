using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Snapshots of earlier versions; keeps the last few that were read whole, because reruns ask for one version many times. Thread-safe.</summary>
/// <param name="reader">Reads them.</param>
internal sealed class EarlierVersions(SnapshotReader reader) : IDisposable
{
    private const int MostKept = 4;
    private const string PolicyPrefix = "policies/";

    private readonly SemaphoreSlim _reading = new(1);
    private readonly Lock _gate = new();
    private readonly LinkedList<CatalogueSnapshot> _lastUsedFirst = new();

    /// <summary>The snapshot of a version.</summary>
    /// <param name="stamp">Version, as the records have it.</param>
    /// <param name="names">Names of the structures wanted, and of policies that may be gone by now; null for everything.</param>
    /// <param name="newest">A snapshot not older than the version.</param>
    /// <param name="cancellation">Ends the reading.</param>
    public async Task<CatalogueSnapshot> AsOfAsync(
        VersionStamp stamp, IReadOnlyCollection<string>? names, CatalogueSnapshot newest, CancellationToken cancellation)
    {
        var whole = newest.Stamp == stamp ? newest : FindKept(stamp);
        if (names is null)
        {
            return whole ?? await ReadWholeAsync(stamp, newest, cancellation);
        }

        var named = names.Distinct(StringComparer.Ordinal).ToLookup(n => n.StartsWith(PolicyPrefix, StringComparison.Ordinal));
        return whole is not null
            ? CatalogueSnapshot.Of(stamp, named[false].Select(whole.Find).OfType<CatalogueEntry>(), whole.Policies.Values)
            : await reader.ReadSomeAsync(stamp, newest, named[false], newest.Policies.Keys.Union(named[true], StringComparer.Ordinal), cancellation);
    }

    /// <inheritdoc/>
    public void Dispose() => _reading.Dispose();

    private async Task<CatalogueSnapshot> ReadWholeAsync(VersionStamp stamp, CatalogueSnapshot newest, CancellationToken cancellation)
    {
        await _reading.WaitAsync(cancellation);
        try
        {
            if (FindKept(stamp) is { } known)
            {
                return known;
            }

            var read = await reader.ReadEarlierAsync(stamp, newest, cancellation);
            lock (_gate)
            {
                _lastUsedFirst.AddFirst(read);
                if (_lastUsedFirst.Count > MostKept)
                {
                    _lastUsedFirst.RemoveLast();
                }
            }

            return read;
        }
        finally
        {
            _reading.Release();
        }
    }

    private CatalogueSnapshot? FindKept(VersionStamp stamp)
    {
        lock (_gate)
        {
            if (_lastUsedFirst.FirstOrDefault(s => s.Stamp == stamp) is not { } known)
            {
                return null;
            }

            _lastUsedFirst.Remove(known);
            _lastUsedFirst.AddFirst(known);
            return known;
        }
    }
}
