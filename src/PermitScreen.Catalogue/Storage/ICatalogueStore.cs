namespace PermitScreen.Catalogue.Storage;

/// <summary>
/// The records: versions, revisions, change sets. Every implementation passes the same contract tests. Whatever is read was compared with its
/// checksum; what is damaged is told as <see cref="StoreException"/> with <see cref="StoreTrouble.Damaged"/> and never handed out.
/// </summary>
/// <exception cref="StoreException">Thrown by every member where the records cannot be read or written; nothing was changed then.</exception>
public interface ICatalogueStore
{
    /// <summary>Reads the newest version from the database: the proof of a current answer.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    Task<VersionStamp> ReadVersionAsync(CancellationToken cancellation);

    /// <summary>The stamp of an earlier version; null where there is no such version.</summary>
    /// <param name="version">Catalogue version.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<VersionStamp?> FindVersionAsync(long version, CancellationToken cancellation);

    /// <summary>Every revision that holds at a version, in order of kind and name (ordinal), read in one transaction.</summary>
    /// <param name="version">Catalogue version.</param>
    /// <param name="cancellation">Ends the reading.</param>
    IAsyncEnumerable<StoredRevision> ReadAsync(long version, CancellationToken cancellation);

    /// <summary>What changed after a version, up to the newest one, read in one transaction.</summary>
    /// <param name="after">Catalogue version.</param>
    /// <param name="cancellation">Ends the reading.</param>
    Task<CatalogueChanges> ReadChangesAsync(long after, CancellationToken cancellation);

    /// <summary>The revision of a resource that holds at a version; null where there is none.</summary>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="version">Catalogue version.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<StoredRevision?> FindAsync(ResourceKind kind, string name, long version, CancellationToken cancellation);

    /// <summary>All revisions of a resource, newest first; empty where there never was one.</summary>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<RevisionHead>> ReadHistoryAsync(ResourceKind kind, string name, CancellationToken cancellation);

    /// <summary>Change sets, newest first.</summary>
    /// <param name="before">Only those of versions below this one; null for all.</param>
    /// <param name="most">How many at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<ChangeSetHead>> ReadChangeSetsAsync(long? before, int most, CancellationToken cancellation);

    /// <summary>Audit entries, newest first.</summary>
    /// <param name="before">Only those of numbers below this one; null for all.</param>
    /// <param name="most">How many at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<AuditEntry>> ReadAuditAsync(long? before, int most, CancellationToken cancellation);

    /// <summary>What was answered to a request before: done, or its id used for another one; null where it was not seen yet.</summary>
    /// <param name="stamp">Stamp of the request.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<ChangeOutcome?> FindRequestAsync(RequestStamp stamp, CancellationToken cancellation);

    /// <summary>Makes a change: version, revision, audit entry, backlog and the request's outcome in one transaction, or nothing.</summary>
    /// <param name="request">Change.</param>
    /// <param name="cancellation">Ends the wait for other writers; a change that has begun is finished.</param>
    Task<ChangeOutcome> CommitAsync(ChangeRequest request, CancellationToken cancellation);
}
