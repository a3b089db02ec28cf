using Grpc.Core;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service.Revisions;

/// <summary>Commits changes, warms the snapshot before the answer goes out, and turns what stands against a change into an error.</summary>
/// <param name="store">Records.</param>
/// <param name="catalogue">Snapshot.</param>
/// <param name="bell">Wakes the worker.</param>
/// <param name="logger">Log.</param>
internal sealed partial class ChangeDesk(ICatalogueStore store, CatalogueGate catalogue, BacklogBell bell, ILogger<ChangeDesk> logger)
{
    /// <summary>An etag that no revision has: for changes whose content was not made from the newest one.</summary>
    public const string NeverNewest = "-";

    /// <summary>Makes a change.</summary>
    /// <returns>The revision that stands now for this request, and the version; no revision where the resource was taken out.</returns>
    /// <exception cref="RpcException">ALREADY_EXISTS, NOT_FOUND, ABORTED or INVALID_ARGUMENT; nothing was changed.</exception>
    public async Task<(StoredRevision? Revision, long Version)> CommitAsync(ChangeRequest request, ResourceKind kind, CancellationToken cancellation)
    {
        var name = request.Edit.Name;
        switch (await store.CommitAsync(request, cancellation))
        {
            case ChangeOutcome.Done { Repeated: false } done:
                await WarmAsync();
                return (Made(request, done.Version), done.Version);
            case ChangeOutcome.Done done:
                return (done.Content is null ? null : await store.FindAsync(kind, name, done.Version, CancellationToken.None), done.Version);
            case ChangeOutcome.Unchanged unchanged:
                return (await store.FindAsync(kind, name, unchanged.Version, CancellationToken.None), unchanged.Version);
            case ChangeOutcome.Exists exists:
                throw BadRequests.Exists(Type(kind), name, FormattableString.Invariant($"{name} is in the catalogue since version {exists.Newest.FromVersion}, etag {exists.Newest.Content.Etag}; revise it instead."));
            case ChangeOutcome.Outdated outdated:
                throw BadRequests.Outdated(name, outdated.Newest);
            case ChangeOutcome.RequestIdReused:
                throw Reused(request.Stamp!);
            default:
                throw BadRequests.NotFound(Type(kind), name, "It is not in the newest catalogue version.");
        }
    }

    /// <summary>The answer to a request that was done before; null where it was not. Asked first: a retry is not to be judged by what came after it.</summary>
    /// <exception cref="RpcException">INVALID_ARGUMENT where the id was used for another request.</exception>
    public async Task<(StoredRevision? Revision, long Version)?> FindRepeatedAsync(RequestStamp? stamp, ResourceKind kind, string name, CancellationToken cancellation) =>
        stamp is null ? null : await store.FindRequestAsync(stamp, cancellation) switch
        {
            ChangeOutcome.Done done => (done.Content is null ? null : await store.FindAsync(kind, name, done.Version, cancellation), done.Version),
            ChangeOutcome.RequestIdReused => throw Reused(stamp),
            _ => null,
        };

    /// <summary>After a commit. A snapshot that cannot be warmed is no failure of the change: every call confirms its version anyway.</summary>
    public async Task WarmAsync()
    {
        bell.Ring();
        try
        {
            await catalogue.RefreshAsync(CancellationToken.None);
        }
        catch (CatalogueUnavailableException error)
        {
            LogNotWarmed(logger, error.Message);
        }
    }

    /// <summary>The revision that a request has just made; null where it took the resource out.</summary>
    private static StoredRevision? Made(ChangeRequest request, long version) =>
        (request.Edit switch
        {
            Edit.Add add => add.Content,
            Edit.Revise revise => revise.Content,
            _ => null,
        }) is { } content
            ? new StoredRevision(new RevisionHead(content.Kind, content.Name, version, null, content.Hash, request.Provenance), content.Bytes)
            : null;

    private static RpcException Reused(RequestStamp stamp) =>
        BadRequests.Of("request_id", $"\"{stamp.RequestId}\" was used for another request; give each request an id of its own.");

    private static string Type(ResourceKind kind) => kind == ResourceKind.Structure ? "permitscreen.dev/Structure" : "permitscreen.dev/Policy";

    [LoggerMessage(EventId = 20, Level = LogLevel.Warning, Message = "A change is kept, but the snapshot could not be brought up to it yet: {Reason}")]
    private static partial void LogNotWarmed(ILogger logger, string reason);
}
