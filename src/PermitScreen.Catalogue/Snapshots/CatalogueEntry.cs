using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>One revision of a structure in memory; made ready for screening when it is first asked for. Thread-safe.</summary>
/// <param name="revision">Revision.</param>
/// <param name="reader">Reads it.</param>
public sealed class CatalogueEntry(StoredRevision revision, IRevisionReader reader)
{
    private PreparedStructure? _prepared;

    /// <summary>Resource name.</summary>
    public string Name => revision.Head.Name;

    /// <summary>The revision.</summary>
    public StoredRevision Revision => revision;

    /// <summary>Ready to be screened; computes its lines where they are not kept yet.</summary>
    public PreparedStructure Prepared => LazyInitializer.EnsureInitialized(ref _prepared, () => reader.ReadStructure(revision));
}
