using Grpc.Core;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Endpoints;

/// <summary>HistoryService: what was changed, when, by whom and why.</summary>
public sealed class HistoryEndpoint : HistoryService.HistoryServiceBase
{
    private const int DefaultPage = 50;
    private const int MostPerPage = 1000;
    private readonly ICatalogueStore _store;
    private readonly RecordsVerification _verification;

    internal HistoryEndpoint(ICatalogueStore store, RecordsVerification verification) => (_store, _verification) = (store, verification);

    /// <inheritdoc/>
    public override async Task<ListRevisionsResponse> ListRevisions(ListRevisionsRequest request, ServerCallContext context)
    {
        var history = await ReadAsync(request.Parent, "parent", context.CancellationToken);
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPage, MostPerPage);
        var (_, start) = Pages.ReadIndex(request.PageToken, 0, history.Count);
        var response = new ListRevisionsResponse { NextPageToken = Pages.Next(0, start, size, history.Count) };
        response.Revisions.AddRange(history.Skip(start).Take(size).Select(HistoryWriter.Write));
        return response;
    }

    /// <inheritdoc/>
    public override async Task<CompareRevisionsResponse> CompareRevisions(CompareRevisionsRequest request, ServerCallContext context)
    {
        var history = await ReadAsync(request.Name, "name", context.CancellationToken);
        var newest = (await _store.ReadVersionAsync(context.CancellationToken)).Version;
        RequireVersion("before_version", request.HasBeforeVersion, request.BeforeVersion, newest);
        RequireVersion("after_version", request.HasAfterVersion, request.AfterVersion, newest);
        var after = request.HasAfterVersion ? history.FirstOrDefault(h => h.HoldsAt(request.AfterVersion)) : history[0];
        var before = request.HasBeforeVersion
            ? history.FirstOrDefault(h => h.HoldsAt(request.BeforeVersion))
            : history.FirstOrDefault(h => h.FromVersion < (after?.FromVersion ?? request.AfterVersion));
        var response = new CompareRevisionsResponse { Before = before is null ? null : HistoryWriter.Write(before), After = after is null ? null : HistoryWriter.Write(after) };
        var (old, now) = (await ContentAsync(before, context.CancellationToken), await ContentAsync(after, context.CancellationToken));
        response.Differences.AddRange(MessageDifferences.Of(HistoryWriter.Message(old), HistoryWriter.Message(now)));
        response.LinesDiffer = !Keys(old).SetEquals(Keys(now));
        return response;
    }

    /// <inheritdoc/>
    public override async Task<ListChangeSetsResponse> ListChangeSets(ListChangeSetsRequest request, ServerCallContext context)
    {
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPage, MostPerPage);
        var sets = await _store.ReadChangeSetsAsync(Pages.Read(request.PageToken)?.Version, size + 1, context.CancellationToken);
        var response = new ListChangeSetsResponse { NextPageToken = sets.Count > size ? Pages.Token(sets[size - 1].Version, "") : "" };
        response.ChangeSets.AddRange(sets.Take(size).Select(HistoryWriter.Write));
        return response;
    }

    /// <inheritdoc/>
    public override async Task<ListAuditEntriesResponse> ListAuditEntries(ListAuditEntriesRequest request, ServerCallContext context)
    {
        var size = Pages.Size(request.HasPageSize, request.PageSize, DefaultPage, MostPerPage);
        var entries = await _store.ReadAuditAsync(Pages.Read(request.PageToken)?.Version, size + 1, context.CancellationToken);
        var response = new ListAuditEntriesResponse { NextPageToken = entries.Count > size ? Pages.Token(entries[size - 1].Sequence, "") : "" };
        response.AuditEntries.AddRange(entries.Take(size).Select(HistoryWriter.Write));
        return response;
    }

    /// <inheritdoc/>
    public override async Task VerifyRecords(VerifyRecordsRequest request, IServerStreamWriter<VerifyRecordsResponse> responseStream, ServerCallContext context)
    {
        Digest? known = null;
        if (request.KnownHash.Length > 0)
        {
            known = request.KnownHash.Length == 2 * Digest.Length && request.KnownHash.All(char.IsAsciiHexDigit)
                ? Digest.Parse(request.KnownHash)
                : throw BadRequests.Of("known_hash", "Allowed are 64 hexadecimal digits, as an earlier verification printed them.");
        }

        await _verification.RunAsync(known, responseStream.WriteAsync, context.CancellationToken);
    }

    private static void RequireVersion(string field, bool has, long version, long newest)
    {
        if (has && (version < 0 || version > newest))
        {
            throw BadRequests.NoVersion(field, version, newest);
        }
    }

    private static HashSet<Digest> Keys(StoredRevision? revision) =>
        revision is { Head.Kind: ResourceKind.Structure } && RevisionReader.ReadRecord(revision) is { } record ? [.. TrussKeys.Of(record)] : [];

    private async Task<IReadOnlyList<RevisionHead>> ReadAsync(string name, string field, CancellationToken cancellation)
    {
        var faults = new FaultList();
        var policy = name.StartsWith("policies/", StringComparison.Ordinal);
        if (policy)
        {
            Names.PolicyDocument(faults, field, name);
        }
        else
        {
            Names.Structure(faults, field, name);
        }

        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        var history = await _store.ReadHistoryAsync(policy ? ResourceKind.Policy : ResourceKind.Structure, name, cancellation);
        return history.Count > 0 ? history : throw BadRequests.NotFound(policy ? "permitscreen.dev/Policy" : "permitscreen.dev/Structure", name, "There never was one of this name.");
    }

    private async Task<StoredRevision?> ContentAsync(RevisionHead? head, CancellationToken cancellation) =>
        head is null ? null : await _store.FindAsync(head.Kind, head.Name, head.FromVersion, cancellation);
}
