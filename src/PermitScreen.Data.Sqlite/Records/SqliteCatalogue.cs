using System.Runtime.CompilerServices;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>The records in SQLite.</summary>
/// <param name="file">File with its connections.</param>
internal sealed class SqliteCatalogue(RecordsFile file) : ICatalogueStore
{
    private const int RevisionsBetweenYields = 512;

    /// <inheritdoc/>
    public Task<VersionStamp> ReadVersionAsync(CancellationToken cancellation) => RecordsFile.OnThisThread(() => file.ReadVersion().Stamp, cancellation);

    /// <inheritdoc/>
    public Task<VersionStamp?> FindVersionAsync(long version, CancellationToken cancellation) => file.ReadAsync(
        database =>
        {
            var newest = VersionRow.Read(database);
            return VersionSearch.FindState(database, newest, version) is { } state ? new VersionStamp(newest.Timeline, version, state) : null;
        },
        cancellation);

    /// <inheritdoc/>
    public async IAsyncEnumerable<StoredRevision> ReadAsync(long version, [EnumeratorCancellation] CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        using var lease = file.Readers.Rent();
        using (var cursor = new RevisionCursor(lease.Database, version))
        {
            for (var read = 1; cursor.Next() is { } revision; read++)
            {
                cancellation.ThrowIfCancellationRequested();
                if (read % RevisionsBetweenYields == 0)
                {
                    await Task.Yield();
                }

                yield return revision;
            }
        }

        lease.GiveBack();
    }

    /// <inheritdoc/>
    public Task<CatalogueChanges> ReadChangesAsync(long after, CancellationToken cancellation) =>
        file.ReadAsync(database => ChangesReader.Read(database, after), cancellation);

    /// <inheritdoc/>
    public Task<StoredRevision?> FindAsync(ResourceKind kind, string name, long version, CancellationToken cancellation) => file.ReadAsync(
        database => RevisionSearch.Find(database, kind, name, version) is { } head ? new StoredRevision(head, ContentRow.Read(database, head.Content)) : null,
        cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<RevisionHead>> ReadHistoryAsync(ResourceKind kind, string name, CancellationToken cancellation) =>
        file.ReadAsync(database => RevisionSearch.History(database, kind, name), cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<ChangeSetHead>> ReadChangeSetsAsync(long? before, int most, CancellationToken cancellation) =>
        file.ReadAsync(database => VersionSearch.ChangeSets(database, before, most), cancellation);

    /// <inheritdoc/>
    public Task<IReadOnlyList<AuditEntry>> ReadAuditAsync(long? before, int most, CancellationToken cancellation) =>
        file.ReadAsync(database => AuditSearch.Read(database, before, most), cancellation);

    /// <inheritdoc/>
    public Task<ChangeOutcome?> FindRequestAsync(RequestStamp stamp, CancellationToken cancellation) => file.ReadAsync(database => EditWork.Seen(database, stamp), cancellation);

    /// <inheritdoc/>
    public Task<ChangeOutcome> CommitAsync(ChangeRequest request, CancellationToken cancellation) =>
        file.Writer.WriteAsync(request.Action, database => EditWork.Do(database, request), cancellation);
}
