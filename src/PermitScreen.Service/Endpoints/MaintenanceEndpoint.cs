using System.Security.Cryptography;
using Google.Protobuf;
using Google.Protobuf.WellKnownTypes;
using Grpc.Core;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Errors;
using PermitScreen.Service.Revisions;
using PermitScreen.Service.Workers;

namespace PermitScreen.Service.Endpoints;

/// <summary>MaintenanceService: backlog, collecting, backing up and restoring.</summary>
public sealed class MaintenanceEndpoint : MaintenanceService.MaintenanceServiceBase
{
    private const int FailuresTold = 100;
    private const int EntriesAtOnce = 100;
    private const int ChunkBytes = 256 * 1024;
    private readonly RecordsPlace _place;
    private readonly IRecordKeeping _keeping;
    private readonly IBacklogStore _backlog;
    private readonly ILineStore _lines;
    private readonly ICatalogueStore _store;
    private readonly ICatalogue _catalogue;
    private readonly LineLibrary _library;
    private readonly LineWorker _worker;
    private readonly Restoring _restoring;
    private readonly ChangeCaller _caller;

    internal MaintenanceEndpoint(
        RecordsPlace place, IRecordKeeping keeping, IBacklogStore backlog, ILineStore lines, ICatalogueStore store, ICatalogue catalogue, LineLibrary library, LineWorker worker, Restoring restoring, ChangeCaller caller) =>
        (_place, _keeping, _backlog, _lines, _store, _catalogue, _library, _worker, _restoring, _caller) = (place, keeping, backlog, lines, store, catalogue, library, worker, restoring, caller);

    /// <inheritdoc/>
    public override async Task<GetBacklogResponse> GetBacklog(GetBacklogRequest request, ServerCallContext context)
    {
        // Through the gate: who asks before the catalogue is loaded waits, so that the answer also tells readiness.
        var snapshot = await _catalogue.CurrentAsync(null, context.CancellationToken);
        var (pending, oldest, failures) = await _backlog.ReadSummaryAsync(FailuresTold, context.CancellationToken);
        var backlog = new Backlog
        {
            PendingCount = pending,
            KeptCount = _lines.Count(),
            ComputedCount = _worker.Computed,
            DamagedCount = _library.Counts.Damaged,
            OldestPendingAt = oldest is { } since ? Timestamp.FromDateTimeOffset(since) : null,
            CatalogueVersion = snapshot.Version,
        };
        backlog.Failures.AddRange(failures.Select(f => new BacklogFailure { Structure = f.Structure, Reason = f.Failure ?? "" }));
        return new GetBacklogResponse { Backlog = backlog };
    }

    /// <inheritdoc/>
    public override async Task<CollectLinesResponse> CollectLines(CollectLinesRequest request, ServerCallContext context)
    {
        Caller(context);
        var named = await _backlog.ReadNamedAsync(context.CancellationToken);
        var unnamed = _lines.AllKeys().Where(k => !named.Contains(k)).ToList();
        _lines.Delete([.. unnamed]);
        return new CollectLinesResponse { DeletedCount = unnamed.Count, KeptCount = _lines.Count() };
    }

    /// <inheritdoc/>
    public override async Task ReadBackup(ReadBackupRequest request, IServerStreamWriter<ReadBackupResponse> responseStream, ServerCallContext context)
    {
        var path = _place.FileOf($"backup-{Guid.NewGuid():N}.tmp");
        try
        {
            var stamp = await _keeping.BackUpAsync(path, context.CancellationToken);
            var newest = await HashOfAsync(stamp.Version, context.CancellationToken);
            await using var file = File.OpenRead(path);
            await responseStream.WriteAsync(
                new ReadBackupResponse { Head = new BackupHead { SizeBytes = file.Length, CatalogueVersion = stamp.Version, VersionHash = newest } }, context.CancellationToken);
            using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
            var buffer = new byte[ChunkBytes];
            for (int read; (read = await file.ReadAsync(buffer, context.CancellationToken)) > 0;)
            {
                hash.AppendData(buffer, 0, read);
                await responseStream.WriteAsync(new ReadBackupResponse { Chunk = ByteString.CopyFrom(buffer, 0, read) }, context.CancellationToken);
            }

            await responseStream.WriteAsync(new ReadBackupResponse { Sha256 = Convert.ToHexStringLower(hash.GetHashAndReset()) }, context.CancellationToken);
        }
        finally
        {
            File.Delete(path);
        }
    }

    /// <inheritdoc/>
    public override async Task<RestoreBackupResponse> RestoreBackup(IAsyncStreamReader<RestoreBackupRequest> requestStream, ServerCallContext context)
    {
        var faults = new FaultList();
        if (!await requestStream.MoveNext(context.CancellationToken) || requestStream.Current.Head is not { } head)
        {
            throw BadRequests.Of("head", "Missing; the first message says why the records are restored.");
        }

        var provenance = _caller.Read(context, head.ChangeReason, faults);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }

        var path = _place.FileOf($"restore-{Guid.NewGuid():N}.tmp");
        try
        {
            await ReceiveAsync(requestStream, path, context.CancellationToken);
            if (head.ValidateOnly)
            {
                var held = await _keeping.CheckBackupAsync(path, context.CancellationToken);
                return new RestoreBackupResponse { RestoredVersion = held.Version };
            }

            // Asked only where the caller wants it: records that are damaged may have no version to tell.
            if (head.HasReplacedVersion && (await _store.ReadVersionAsync(context.CancellationToken)).Version is var newest && newest != head.ReplacedVersion)
            {
                throw new RpcException(new Status(StatusCode.Aborted, FormattableString.Invariant($"Version {head.ReplacedVersion} was to be replaced, but the newest is {newest}: somebody changed the catalogue, or it is restored already. Nothing was changed.")));
            }

            return await _restoring.RunAsync(path, provenance, context.CancellationToken);
        }
        catch (StoreException error) when (error.Message.Contains(path, StringComparison.Ordinal))
        {
            // The caller knows the backup, not the name under which it was received.
            throw new StoreException(error.Trouble, error.Message.Replace(path, "the backup", StringComparison.Ordinal), error);
        }
        finally
        {
            File.Delete(path);
        }
    }

    private static async Task ReceiveAsync(IAsyncStreamReader<RestoreBackupRequest> stream, string path, CancellationToken cancellation)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        await using var file = new FileStream(path, FileMode.CreateNew, FileAccess.Write, FileShare.None);
        while (await stream.MoveNext(cancellation))
        {
            switch (stream.Current.PartCase)
            {
                case RestoreBackupRequest.PartOneofCase.Chunk:
                    hash.AppendData(stream.Current.Chunk.Span);
                    await file.WriteAsync(stream.Current.Chunk.Memory, cancellation);
                    break;
                case RestoreBackupRequest.PartOneofCase.Sha256:
                    var received = Convert.ToHexStringLower(hash.GetHashAndReset());
                    if (!string.Equals(received, stream.Current.Sha256, StringComparison.OrdinalIgnoreCase))
                    {
                        throw BadRequests.Of("sha256", $"Found {stream.Current.Sha256}, but the bytes received have {received}; send the file again. Nothing was changed.");
                    }

                    return;
                default:
                    throw BadRequests.Of("chunk", "After the first message come chunks of the file, and its SHA-256 last.");
            }
        }

        throw BadRequests.Of("sha256", "Missing; the last message holds the SHA-256 over all bytes. Nothing was changed.");
    }

    /// <summary>Hash of the audit entry that made a version; others may have written since the copy was made.</summary>
    private async Task<string> HashOfAsync(long version, CancellationToken cancellation)
    {
        for (long? before = null; ;)
        {
            var entries = await _store.ReadAuditAsync(before, EntriesAtOnce, cancellation);
            if (entries.FirstOrDefault(e => e.Version == version) is { } made)
            {
                return made.Hash.ToString();
            }

            if (entries.Count < EntriesAtOnce)
            {
                // Version 0 was made by no change set, and other records may have been restored since.
                return "";
            }

            before = entries[^1].Sequence;
        }
    }

    private void Caller(ServerCallContext context)
    {
        var faults = new FaultList();
        _caller.Read(context, faults);
        if (faults.Any)
        {
            throw BadRequests.From("The request", faults.All);
        }
    }
}
