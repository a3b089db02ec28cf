using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Rating.Policies;

namespace PermitScreen.Service.Tests.Support;

/// <summary>A snapshot of structures that are ready already, without records behind it.</summary>
internal sealed class Ready(PreparedStructure structure) : IRevisionReader
{
    private static readonly Provenance Nobody = new("test", "test", DateTimeOffset.UnixEpoch);

    /// <summary>Version 1 of just these structures.</summary>
    public static CatalogueSnapshot Snapshot(IEnumerable<PreparedStructure> structures) =>
        CatalogueSnapshot.Of(new VersionStamp(Guid.Empty, 1, default), structures.Select(Entry), []);

    public PreparedStructure ReadStructure(StoredRevision revision) => structure;

    public PolicyDocument? ReadPolicy(StoredRevision revision) => null;

    private static CatalogueEntry Entry(PreparedStructure structure) =>
        new(new StoredRevision(new RevisionHead(ResourceKind.Structure, structure.Record.Name, 1, null, default, Nobody), ReadOnlyMemory<byte>.Empty), new Ready(structure));
}
