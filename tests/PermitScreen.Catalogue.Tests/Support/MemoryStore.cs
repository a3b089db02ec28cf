using System.Collections.Immutable;
using System.Runtime.CompilerServices;
using System.Text;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>Records in memory: every version kept, answers that a test may hold back, and troubles that it may switch on.</summary>
internal sealed class MemoryStore : ICatalogueStore
{
    private static readonly DateTimeOffset Start = new(2026, 8, 1, 6, 0, 0, TimeSpan.Zero);

    private readonly Lock _gate = new();
    private readonly Dictionary<(ResourceKind Kind, string Name), List<StoredRevision>> _revisions = [];
    private List<VersionStamp> _stamps = [new(new Guid("0a0b0c0d-0000-0000-0000-000000000001"), 0, default)];
    private int _versionReads;
    private int _wholeReads;

    /// <summary>Runs after a version was looked up and before it is answered.</summary>
    internal Func<Task>? BeforeAnswer { get; set; }

    /// <summary>What every read runs into.</summary>
    internal StoreException? Trouble { get; set; }

    /// <summary>A structure that changes do not tell of: a fault in the store.</summary>
    internal string? LeftOutOfChanges { get; set; }

    /// <summary>A structure that a whole read leaves out.</summary>
    internal string? LeftOutOfWhole { get; set; }

    internal int VersionReads => Volatile.Read(ref _versionReads);

    internal int WholeReads => Volatile.Read(ref _wholeReads);

    internal long Newest
    {
        get
        {
            lock (_gate)
            {
                return _stamps[^1].Version;
            }
        }
    }

    /// <summary>One version with some changes: new content by name; null takes the resource out.</summary>
    internal VersionStamp Commit(params (string Name, string? Content)[] changes)
    {
        lock (_gate)
        {
            var (stamp, sum) = (_stamps[^1], _stamps[^1].State);
            var version = stamp.Version + 1;
            foreach (var (name, content) in changes)
            {
                var key = (KindOf(name), name);
                var all = _revisions.TryGetValue(key, out var known) ? known : _revisions[key] = [];
                if (all.Count > 0 && all[^1].Head.ToVersion is null)
                {
                    sum = sum.Without(all[^1].Head);
                    all[^1] = all[^1] with { Head = all[^1].Head with { ToVersion = version } };
                }

                if (content is not null)
                {
                    var bytes = Encoding.UTF8.GetBytes(content);
                    var head = new RevisionHead(key.Item1, name, version, null, Digest.Of(bytes), new Provenance("tester", "because", Start.AddMilliseconds(version)));
                    sum = sum.With(head);
                    all.Add(new StoredRevision(head, bytes));
                }
            }

            _stamps.Add(new VersionStamp(stamp.Timeline, version, sum));
            return _stamps[^1];
        }
    }

    /// <summary>Other records in the place of these, as after a restore: another timeline, a newer version.</summary>
    internal void Restore(params (string Name, string? Content)[] content)
    {
        lock (_gate)
        {
            var version = _stamps[^1].Version + 10;
            _revisions.Clear();
            _stamps = [new(new Guid("0a0b0c0d-0000-0000-0000-000000000002"), version, default)];
            Commit(content);
        }
    }

    /// <summary>Everything at a version, by name.</summary>
    internal Dictionary<string, string> At(long version)
    {
        lock (_gate)
        {
            return _revisions.Values.SelectMany(r => r).Where(r => r.Head.HoldsAt(version))
                .ToDictionary(r => r.Head.Name, r => Encoding.UTF8.GetString(r.Content.Span), StringComparer.Ordinal);
        }
    }

    public async Task<VersionStamp> ReadVersionAsync(CancellationToken cancellation)
    {
        Interlocked.Increment(ref _versionReads);
        Check();
        VersionStamp stamp;
        lock (_gate)
        {
            stamp = _stamps[^1];
        }

        await (BeforeAnswer?.Invoke() ?? Task.CompletedTask).WaitAsync(cancellation);
        return stamp;
    }

    public Task<VersionStamp?> FindVersionAsync(long version, CancellationToken cancellation)
    {
        Check();
        lock (_gate)
        {
            return Task.FromResult(_stamps.Find(s => s.Version == version && version > 0));
        }
    }

    public async IAsyncEnumerable<StoredRevision> ReadAsync(long version, [EnumeratorCancellation] CancellationToken cancellation)
    {
        Interlocked.Increment(ref _wholeReads);
        Check();
        StoredRevision[] all;
        lock (_gate)
        {
            all = [.. _revisions.Values.SelectMany(r => r).Where(r => r.Head.HoldsAt(version) && r.Head.Name != LeftOutOfWhole)
                .OrderBy(r => r.Head.Kind).ThenBy(r => r.Head.Name, StringComparer.Ordinal)];
        }

        await Task.Yield();
        foreach (var revision in all)
        {
            cancellation.ThrowIfCancellationRequested();
            yield return revision;
        }
    }

    public Task<CatalogueChanges> ReadChangesAsync(long after, CancellationToken cancellation)
    {
        Check();
        lock (_gate)
        {
            var now = _stamps[^1];
            var both = _revisions.Values.SelectMany(r => r).Where(r => r.Head.Name != LeftOutOfChanges).ToList();
            var began = both.Where(r => r.Head.HoldsAt(now.Version) && !r.Head.HoldsAt(after)).ToImmutableArray();
            var gone = both.Where(r => r.Head.HoldsAt(after)).Select(r => (r.Head.Kind, r.Head.Name))
                .Except(both.Where(r => r.Head.HoldsAt(now.Version)).Select(r => (r.Head.Kind, r.Head.Name))).ToImmutableArray();
            return Task.FromResult(new CatalogueChanges(now, began, gone));
        }
    }

    public Task<StoredRevision?> FindAsync(ResourceKind kind, string name, long version, CancellationToken cancellation)
    {
        Check();
        lock (_gate)
        {
            return Task.FromResult(_revisions.TryGetValue((kind, name), out var all) ? all.Find(r => r.Head.HoldsAt(version)) : null);
        }
    }

    public Task<IReadOnlyList<RevisionHead>> ReadHistoryAsync(ResourceKind kind, string name, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<IReadOnlyList<ChangeSetHead>> ReadChangeSetsAsync(long? before, int most, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<IReadOnlyList<AuditEntry>> ReadAuditAsync(long? before, int most, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<ChangeOutcome?> FindRequestAsync(RequestStamp stamp, CancellationToken cancellation) => throw new NotSupportedException();

    public Task<ChangeOutcome> CommitAsync(ChangeRequest request, CancellationToken cancellation) => throw new NotSupportedException();

    private static ResourceKind KindOf(string name) => name.StartsWith("policies/", StringComparison.Ordinal) ? ResourceKind.Policy : ResourceKind.Structure;

    private void Check()
    {
        if (Trouble is { } trouble)
        {
            throw trouble;
        }
    }
}
