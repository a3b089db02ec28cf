using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>
/// The whole catalogue at one version: a large segment, and over it the few structures revised since it was made. Immutable, shared by all calls
/// that use it, alive while one of them does; a revision costs the size of its structure.
/// </summary>
public sealed class CatalogueSnapshot
{
    private readonly CatalogueSegment _segment;
    private readonly ImmutableSortedDictionary<string, CatalogueEntry?> _overlay;

    private CatalogueSnapshot(
        VersionStamp stamp,
        CatalogueSegment segment,
        ImmutableSortedDictionary<string, CatalogueEntry?> overlay,
        int count,
        ImmutableSortedDictionary<string, PolicyEntry> policies,
        StateSum sum)
    {
        (Stamp, _segment, _overlay, Count, Policies, Sum) = (stamp, segment, overlay, count, policies, sum);
    }

    /// <summary>The version and the records that it is one of.</summary>
    public VersionStamp Stamp { get; }

    /// <summary>Catalogue version.</summary>
    public long Version => Stamp.Version;

    /// <summary>Sum over the revisions that are really here, kept along with each change; a whole and true copy has that of its <see cref="Stamp"/>.</summary>
    public StateSum Sum { get; }

    /// <summary>Number of structures.</summary>
    public int Count { get; }

    /// <summary>Number of structures revised since the segment was made.</summary>
    public int OverlayCount => _overlay.Count;

    /// <summary>Policy documents by resource name, policies/{policy}@{version}, in order of name.</summary>
    public ImmutableSortedDictionary<string, PolicyEntry> Policies { get; }

    /// <summary>A snapshot of structures and policies of different names.</summary>
    /// <param name="stamp">Version.</param>
    /// <param name="structures">Structures.</param>
    /// <param name="policies">Policy documents.</param>
    public static CatalogueSnapshot Of(VersionStamp stamp, IEnumerable<CatalogueEntry> structures, IEnumerable<PolicyEntry> policies)
    {
        var segment = new CatalogueSegment(structures);
        var byName = ImmutableSortedDictionary.CreateBuilder<string, PolicyEntry>(StringComparer.Ordinal);
        foreach (var policy in policies)
        {
            byName[policy.Revision.Head.Name] = policy;
        }

        var sum = default(StateSum);
        foreach (var entry in segment.Entries)
        {
            sum = sum.With(entry.Revision.Head);
        }

        return new CatalogueSnapshot(
            stamp,
            segment,
            ImmutableSortedDictionary.Create<string, CatalogueEntry?>(StringComparer.Ordinal),
            segment.Count,
            byName.ToImmutable(),
            byName.Values.Aggregate(sum, (s, p) => s.With(p.Revision.Head)));
    }

    /// <summary>The structure of a resource name, or null.</summary>
    /// <param name="name">Resource name, structures/{structure}.</param>
    public CatalogueEntry? Find(string name) => _overlay.TryGetValue(name, out var revised) ? revised : _segment.Find(name);

    /// <summary>Structures in order of name.</summary>
    /// <param name="after">Only those whose name is greater; null for all.</param>
    public IEnumerable<CatalogueEntry> StructuresAfter(string? after = null)
    {
        using var revised = _overlay.SkipWhile(o => after is not null && string.CompareOrdinal(o.Key, after) <= 0).GetEnumerator();
        var more = revised.MoveNext();
        for (var i = _segment.After(after); i < _segment.Count || more;)
        {
            var order = !more ? -1 : i >= _segment.Count ? 1 : string.CompareOrdinal(_segment.Entries[i].Name, revised.Current.Key);
            if (order < 0)
            {
                yield return _segment.Entries[i];
                i++;
                continue;
            }

            if (revised.Current.Value is { } entry)
            {
                yield return entry;
            }

            i += order == 0 ? 1 : 0;
            more = revised.MoveNext();
        }
    }

    /// <summary>The snapshot of a newer version, at the cost of what changed.</summary>
    /// <param name="changes">What changed since this version.</param>
    /// <param name="reader">Reads revisions.</param>
    public CatalogueSnapshot Advance(CatalogueChanges changes, IRevisionReader reader)
    {
        var overlay = _overlay.ToBuilder();
        var policies = Policies.ToBuilder();
        var (count, sum) = (Count, Sum);
        foreach (var revision in changes.Began)
        {
            TakeOut(revision.Head.Kind, revision.Head.Name);
            sum = sum.With(revision.Head);
            if (revision.Head.Kind == ResourceKind.Policy)
            {
                policies[revision.Head.Name] = new PolicyEntry(revision, reader.ReadPolicy(revision));
                continue;
            }

            count++;
            overlay[revision.Head.Name] = new CatalogueEntry(revision, reader);
        }

        foreach (var (kind, name) in changes.Gone)
        {
            TakeOut(kind, name);
        }

        return new CatalogueSnapshot(changes.Stamp, _segment, overlay.ToImmutable(), count, policies.ToImmutable(), sum);

        void TakeOut(ResourceKind kind, string name)
        {
            if (kind == ResourceKind.Policy)
            {
                sum = policies.TryGetValue(name, out var policy) ? sum.Without(policy.Revision.Head) : sum;
                policies.Remove(name);
            }
            else if ((overlay.TryGetValue(name, out var known) ? known : _segment.Find(name)) is { } entry)
            {
                sum = sum.Without(entry.Revision.Head);
                count--;
                overlay[name] = null;
            }
        }
    }

    /// <summary>The same version with the overlay put into a segment of its own.</summary>
    public CatalogueSnapshot Merged() => new(Stamp, _segment.With(_overlay), _overlay.Clear(), Count, Policies, Sum);

    /// <summary>This version over a segment that was made of an earlier snapshot in the meantime.</summary>
    /// <param name="earlier">The merged snapshot, of the same timeline and not newer than this one.</param>
    public CatalogueSnapshot Over(CatalogueSnapshot earlier)
    {
        // What is the same entry in the new segment needs no place in the overlay.
        var overlay = _overlay.RemoveRange(_overlay.Where(o => ReferenceEquals(earlier._segment.Find(o.Key), o.Value)).Select(o => o.Key));
        return new CatalogueSnapshot(Stamp, earlier._segment, overlay, Count, Policies, Sum);
    }

    /// <summary>Whether both rest on one segment: only then may what was merged of the one take the place of the segment of the other.</summary>
    /// <param name="other">Another snapshot.</param>
    internal bool SharesSegmentWith(CatalogueSnapshot other) => ReferenceEquals(_segment, other._segment);
}
