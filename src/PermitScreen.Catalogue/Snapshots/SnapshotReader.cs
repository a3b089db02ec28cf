using System.Globalization;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Makes snapshots of the records, and hands out none that does not add up to its version.</summary>
/// <param name="store">Records.</param>
/// <param name="reader">Reads revisions.</param>
/// <param name="tell">Takes what an operator should know.</param>
internal sealed class SnapshotReader(ICatalogueStore store, IRevisionReader reader, Action<string> tell)
{
    private const int Attempts = 2;

    /// <summary>The newest version, read whole.</summary>
    /// <exception cref="CatalogueUnavailableException">What was read does not add up.</exception>
    public async Task<CatalogueSnapshot> ReadNewestAsync(IProgress<long>? progress, CancellationToken cancellation)
    {
        for (var attempt = 1; ; attempt++)
        {
            var stamp = await store.ReadVersionAsync(cancellation);
            var snapshot = await ReadWholeAsync(stamp, progress, cancellation);
            if (IsTrue(snapshot))
            {
                return snapshot;
            }

            if (attempt == Attempts)
            {
                throw DoesNotAddUp(stamp.Version);
            }
        }
    }

    /// <summary>The newest version, at the cost of what changed since a snapshot; read whole where that is no way there.</summary>
    public async Task<CatalogueSnapshot> AdvanceAsync(CatalogueSnapshot snapshot, CancellationToken cancellation)
    {
        // Asked first: other records may not know the version at all that the snapshot has.
        var stamp = await store.ReadVersionAsync(cancellation);
        if (IsReplaced(stamp, snapshot))
        {
            return await ReadReplacedAsync(cancellation);
        }

        var changes = await store.ReadChangesAsync(snapshot.Version, cancellation);
        if (IsReplaced(changes.Stamp, snapshot))
        {
            return await ReadReplacedAsync(cancellation);
        }

        var newest = snapshot.Advance(changes, reader);
        if (IsTrue(newest))
        {
            return newest;
        }

        tell(string.Create(CultureInfo.InvariantCulture, $"The snapshot does not add up to version {newest.Version}; the catalogue is read anew."));
        return await ReadNewestAsync(progress: null, cancellation);
    }

    private static bool IsReplaced(VersionStamp stamp, CatalogueSnapshot snapshot) =>
        stamp.Timeline != snapshot.Stamp.Timeline || stamp.Version < snapshot.Version;

    private Task<CatalogueSnapshot> ReadReplacedAsync(CancellationToken cancellation)
    {
        tell("The records were replaced; the catalogue is read anew.");
        return ReadNewestAsync(progress: null, cancellation);
    }

    /// <summary>What a segment file holds; null where there is none, or one that is no true copy of these records.</summary>
    public async Task<CatalogueSnapshot?> ReadFileAsync(string path, IProgress<long>? progress, CancellationToken cancellation)
    {
        var content = SegmentFile.TryRead(path, progress, out var refusal, cancellation);
        if (content is not null && await store.FindVersionAsync(content.Stamp.Version, cancellation) != content.Stamp)
        {
            refusal = "it is no copy of these records";
        }

        if (refusal is not null)
        {
            tell($"The segment file {path} is not used: {refusal}. The catalogue is read from the records and the file written anew.");
        }

        return content is null || refusal is not null
            ? null
            : CatalogueSnapshot.Of(
                content.Stamp,
                content.Revisions.Where(r => r.Head.Kind == ResourceKind.Structure).Select(r => new CatalogueEntry(r, reader)),
                content.Revisions.Where(r => r.Head.Kind == ResourceKind.Policy).Select(r => new PolicyEntry(r, reader.ReadPolicy(r))));
    }

    /// <summary>An earlier version, read whole; revisions that the newest snapshot still has are shared with it.</summary>
    /// <exception cref="CatalogueUnavailableException">What was read does not add up.</exception>
    public async Task<CatalogueSnapshot> ReadEarlierAsync(VersionStamp stamp, CatalogueSnapshot newest, CancellationToken cancellation)
    {
        var snapshot = await ReadWholeAsync(stamp, progress: null, cancellation, newest);
        return IsTrue(snapshot) ? snapshot : throw DoesNotAddUp(stamp.Version);
    }

    /// <summary>Some structures and policies (names each once) as they were at an earlier version.</summary>
    public async Task<CatalogueSnapshot> ReadSomeAsync(
        VersionStamp stamp, CatalogueSnapshot newest, IEnumerable<string> structures, IEnumerable<string> policies, CancellationToken cancellation)
    {
        var entries = new List<CatalogueEntry>();
        foreach (var name in structures)
        {
            if (await store.FindAsync(ResourceKind.Structure, name, stamp.Version, cancellation) is { } revision)
            {
                entries.Add(Entry(revision, newest));
            }
        }

        var documents = new List<PolicyEntry>();
        foreach (var name in policies)
        {
            if (await store.FindAsync(ResourceKind.Policy, name, stamp.Version, cancellation) is { } revision)
            {
                documents.Add(new PolicyEntry(revision, reader.ReadPolicy(revision)));
            }
        }

        // Each was read by itself: between two of them the records may have been replaced.
        return await store.FindVersionAsync(stamp.Version, cancellation) == stamp
            ? CatalogueSnapshot.Of(stamp, entries, documents)
            : throw new CatalogueUnavailableException("The records were replaced while they were read; ask again.");
    }

    private async Task<CatalogueSnapshot> ReadWholeAsync(
        VersionStamp stamp, IProgress<long>? progress, CancellationToken cancellation, CatalogueSnapshot? newest = null)
    {
        var structures = new List<CatalogueEntry>();
        var policies = new List<PolicyEntry>();
        await foreach (var revision in store.ReadAsync(stamp.Version, cancellation))
        {
            if (revision.Head.Kind == ResourceKind.Policy)
            {
                policies.Add(new PolicyEntry(revision, reader.ReadPolicy(revision)));
            }
            else
            {
                structures.Add(Entry(revision, newest));
            }

            progress?.Report(structures.Count + (long)policies.Count);
        }

        return CatalogueSnapshot.Of(stamp, structures, policies);
    }

    /// <summary>Shared where it is the same revision: it may have its lines already.</summary>
    private CatalogueEntry Entry(StoredRevision revision, CatalogueSnapshot? newest) =>
        newest?.Find(revision.Head.Name) is { } known
        && known.Revision.Head.FromVersion == revision.Head.FromVersion
        && known.Revision.Head.Content == revision.Head.Content
            ? known
            : new CatalogueEntry(revision, reader);

    private static bool IsTrue(CatalogueSnapshot snapshot) => snapshot.Sum == snapshot.Stamp.State;

    private static CatalogueUnavailableException DoesNotAddUp(long version) => new(string.Create(
        CultureInfo.InvariantCulture,
        $"The revisions read do not add up to catalogue version {version}: a record is missing, or one too many. Verify the records, and restore a backup where they are damaged."));
}
