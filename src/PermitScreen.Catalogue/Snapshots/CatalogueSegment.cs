using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>The bulk of the structures of a snapshot: immutable, in order of name, shared by all snapshots that rest on it.</summary>
public sealed class CatalogueSegment
{
    private readonly CatalogueEntry[] _entries;
    private readonly string[] _names;

    /// <summary>Takes entries of different names.</summary>
    /// <param name="entries">Entries, in any order.</param>
    public CatalogueSegment(IEnumerable<CatalogueEntry> entries)
    {
        _entries = [.. entries];
        _names = Array.ConvertAll(_entries, e => e.Name);
        Array.Sort(_names, _entries, StringComparer.Ordinal);
    }

    /// <summary>A segment of nothing.</summary>
    public static CatalogueSegment Empty { get; } = new([]);

    /// <summary>Entries in order of name.</summary>
    public ReadOnlySpan<CatalogueEntry> Entries => _entries;

    /// <summary>Number of entries.</summary>
    public int Count => _entries.Length;

    /// <summary>The entry of a name, or null.</summary>
    /// <param name="name">Resource name.</param>
    public CatalogueEntry? Find(string name) =>
        Array.BinarySearch(_names, name, StringComparer.Ordinal) is var at && at >= 0 ? _entries[at] : null;

    /// <summary>Index of the first entry whose name is greater.</summary>
    /// <param name="name">Resource name; null for the first entry of all.</param>
    public int After(string? name)
    {
        if (name is null)
        {
            return 0;
        }

        var at = Array.BinarySearch(_names, name, StringComparer.Ordinal);
        return at >= 0 ? at + 1 : ~at;
    }

    /// <summary>The segment with an overlay put into it.</summary>
    /// <param name="overlay">Structures revised since; null where one is gone.</param>
    internal CatalogueSegment With(ImmutableSortedDictionary<string, CatalogueEntry?> overlay) =>
        new(_entries.Where(e => !overlay.ContainsKey(e.Name)).Concat(overlay.Values.OfType<CatalogueEntry>()));
}
