using System.Collections.Immutable;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Records;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Workers;

/// <summary>
/// Computes and keeps the influence lines of every effect of every structure as change sets land. Killed anywhere it goes on where it was: lines
/// are struck off the backlog only after they are kept, and keeping them twice changes nothing.
/// </summary>
internal sealed partial class LineWorker : BackgroundService
{
    private const int TrussesAtOnce = 128;
    private static readonly TimeSpan LongestRest = TimeSpan.FromSeconds(5);
    private static readonly TimeSpan AfterTrouble = TimeSpan.FromSeconds(2);
    private readonly CatalogueGate _catalogue;
    private readonly ICatalogueStore _store;
    private readonly IBacklogStore _backlog;
    private readonly ILineStore _lines;
    private readonly LineLibrary _library;
    private readonly BacklogRenewal _renewal;
    private readonly BacklogBell _bell;
    private readonly RecordsPlace _place;
    private readonly ILogger<LineWorker> _logger;
    private long _computed;
    private volatile string? _noted;
    private volatile bool _renew;

    public LineWorker(
        CatalogueGate catalogue, ICatalogueStore store, IBacklogStore backlog, ILineStore lines, LineLibrary library, BacklogRenewal renewal, BacklogBell bell, RecordsPlace place, ILogger<LineWorker> logger) =>
        (_catalogue, _store, _backlog, _lines, _library, _renewal, _bell, _place, _logger) = (catalogue, store, backlog, lines, library, renewal, bell, place, logger);

    /// <summary>Trusses computed and kept since the service started.</summary>
    public long Computed => Interlocked.Read(ref _computed);

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        await Task.Yield();
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                await RenewAsync(stoppingToken);
                if (await WorkAsync(stoppingToken) == 0)
                {
                    await _bell.WaitAsync(LongestRest, stoppingToken);
                }
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
            catch (CatalogueUnavailableException) when (!_catalogue.Ready)
            {
                return;
            }
#pragma warning disable CA1031 // The worker must outlive whatever happens to one batch; calls compute their lines themselves meanwhile.
            catch (Exception error)
#pragma warning restore CA1031
            {
                LogTrouble(_logger, error, error.Message);
                await Task.Delay(AfterTrouble, stoppingToken).ContinueWith(_ => { }, TaskScheduler.Default);
            }
        }
    }

    /// <summary>Looks soon whether every structure's lines are kept.</summary>
    public void RenewSoon()
    {
        _noted = null;
        _renew = true;
        _bell.Ring();
    }

    /// <summary>
    /// After the lines were lost, under another version of the mechanics, or after a restore, every structure whose lines are not kept goes on the
    /// backlog. What was done is noted only afterwards: killed in between, it is done again.
    /// </summary>
    private async Task RenewAsync(CancellationToken cancellation)
    {
        await _catalogue.CurrentAsync(null, cancellation);
        var lines = _place.LinesId();
        var state = $"{TrussKey.MechanicsVersion}/{lines}";
        if (lines.Length == 0 || (state == _noted && !_renew))
        {
            return;
        }

        if (_renew || await _backlog.ReadMechanicsVersionAsync(cancellation) != state)
        {
            _renew = false;
            var count = await _renewal.RenewMissingAsync(cancellation);
            await _backlog.NoteMechanicsVersionAsync(state, cancellation);
            if (count > 0)
            {
                LogRenewed(_logger, count);
            }
        }

        _noted = state;
    }

    /// <summary>One batch; returns how many were taken up.</summary>
    private async Task<int> WorkAsync(CancellationToken cancellation)
    {
        var pending = await _backlog.ReadPendingAsync(TrussesAtOnce, cancellation);
        if (pending.Count == 0)
        {
            return 0;
        }

        var blobs = new List<(Digest Key, byte[] Blob)>();
        var ready = new List<PendingLines>();
        foreach (var work in pending)
        {
            cancellation.ThrowIfCancellationRequested();
            if (await FailureAsync(work, blobs, cancellation) is { } failure)
            {
                await _backlog.NoteFailureAsync(work.Key, failure, cancellation);
            }
            else
            {
                ready.Add(work);
            }
        }

        if (blobs.Count > 0)
        {
            _lines.Keep(blobs);
            Interlocked.Add(ref _computed, blobs.Count);
        }

        // Only now: a kill before this line leaves them on the backlog, and they are found kept.
        ImmutableArray<Digest> keys = [.. ready.Select(r => r.Key)];
        await _backlog.StrikeAsync(keys, CancellationToken.None);
        if (_lines.Known(keys).Count < keys.Length)
        {
            // Somebody deleted lines while they were struck off.
            RenewSoon();
        }

        return pending.Count;
    }

    /// <summary>Why lines cannot be computed; null where they are kept, or among the blobs to be kept.</summary>
    private async Task<string?> FailureAsync(PendingLines work, List<(Digest Key, byte[] Blob)> blobs, CancellationToken cancellation)
    {
        try
        {
            if (await TrussAsync(work, cancellation) is not { } truss)
            {
                return "No kept revision that this version of the service can read has a truss of this address.";
            }

            var faults = new FaultList();
            if (!_library.Ensure(truss, faults, out var blob))
            {
                return string.Join(" ", faults.All);
            }

            blobs.AddRange(blob is { } toKeep ? [toKeep] : []);
            return null;
        }
        catch (StoreException error) when (error.Trouble == StoreTrouble.Damaged)
        {
            // One damaged revision must not hold up the lines of all others.
            return error.Message;
        }
        catch (InvalidOperationException error)
        {
            return error.Message;
        }
    }

    private async Task<TrussModel?> TrussAsync(PendingLines work, CancellationToken cancellation)
    {
        var snapshot = await _catalogue.CurrentAsync(null, cancellation);
        var revision = snapshot.Find(work.Structure)?.Revision;
        if (revision?.Head.Content != work.Content)
        {
            var history = await _store.ReadHistoryAsync(ResourceKind.Structure, work.Structure, cancellation);
            revision = history.FirstOrDefault(h => h.Content == work.Content) is { } head
                ? await _store.FindAsync(ResourceKind.Structure, work.Structure, head.FromVersion, cancellation)
                : null;
        }

        return revision is null ? null : Truss(RevisionReader.ReadRecord(revision), work.Key);
    }

    private static TrussModel? Truss(StructureRecord? record, Digest key) =>
        record?.Units.Select(u => u.Truss).OfType<TrussModel>().FirstOrDefault(t => TrussKey.Of(t) == key);

    [LoggerMessage(EventId = 10, Level = LogLevel.Warning, Message = "Influence lines could not be kept; they are computed again. {Reason}")]
    private static partial void LogTrouble(ILogger logger, Exception error, string reason);

    [LoggerMessage(EventId = 11, Level = LogLevel.Information, Message = "The lines of {Count} structures are not kept, or of another version of the mechanics; they are on the backlog")]
    private static partial void LogRenewed(ILogger logger, int count);
}
