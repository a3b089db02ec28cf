using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>Lines that are to be computed: written with the revision that needs them, struck off once they are kept.</summary>
/// <exception cref="StoreException">Thrown by every member where the records cannot be read or written; nothing was changed then.</exception>
public interface IBacklogStore
{
    /// <summary>Pending lines without a failure, oldest first, each key once.</summary>
    /// <param name="most">How many at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlyList<PendingLines>> ReadPendingAsync(int most, CancellationToken cancellation);

    /// <summary>How many are pending, since when, and the failures.</summary>
    /// <param name="mostFailures">How many failures at most.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task<(long Pending, DateTimeOffset? Oldest, IReadOnlyList<PendingLines> Failures)> ReadSummaryAsync(int mostFailures, CancellationToken cancellation);

    /// <summary>Strikes off lines that are kept now.</summary>
    /// <param name="keys">Addresses.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task StrikeAsync(ImmutableArray<Digest> keys, CancellationToken cancellation);

    /// <summary>Notes why lines cannot be computed.</summary>
    /// <param name="key">Address.</param>
    /// <param name="reason">Why.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task NoteFailureAsync(Digest key, string reason, CancellationToken cancellation);

    /// <summary>Puts lines on the backlog that a revision needs and that are not kept: after the lines were lost, or under another version of the mechanics.</summary>
    /// <param name="structure">Structure.</param>
    /// <param name="content">Address of its content.</param>
    /// <param name="keys">Addresses of the lines that it needs now; they replace those noted before.</param>
    /// <param name="instant">When.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task RenewAsync(string structure, Digest content, ImmutableArray<Digest> keys, DateTimeOffset instant, CancellationToken cancellation);

    /// <summary>Addresses of all lines that a retained revision or a staged item names.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    Task<IReadOnlySet<Digest>> ReadNamedAsync(CancellationToken cancellation);

    /// <summary>Version of the mechanics under which the addresses were noted; null where none was.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    Task<string?> ReadMechanicsVersionAsync(CancellationToken cancellation);

    /// <summary>Notes the version of the mechanics.</summary>
    /// <param name="version">Version.</param>
    /// <param name="cancellation">Ends the wait.</param>
    Task NoteMechanicsVersionAsync(string version, CancellationToken cancellation);
}
