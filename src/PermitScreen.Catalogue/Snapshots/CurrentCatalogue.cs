using System.Globalization;
using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Catalogue.Snapshots;

/// <summary>
/// The catalogue in memory, confirmed against the records for every current answer. One reader brings it forward at a time; a background task puts
/// what was revised into the bulk and copies it to a file. Thread-safe.
/// </summary>
public sealed class CurrentCatalogue : ICatalogue, IAsyncDisposable
{
    private const int FewRevised = 256;
    private const int RevisedShare = 8;

    private static readonly TimeSpan FirstPause = TimeSpan.FromMilliseconds(2);
    private static readonly TimeSpan LongestPause = TimeSpan.FromMilliseconds(100);

    private readonly ICatalogueStore _store;
    private readonly SnapshotReader _reader;
    private readonly SegmentKeeping _segments;
    private readonly VersionConfirmation _confirmation;
    private readonly EarlierVersions _earlier;
    private readonly SemaphoreSlim _refreshing = new(1);
    private readonly CancellationTokenSource _life = new();
    private volatile CatalogueSnapshot? _newest;
    private Task _background = Task.CompletedTask;

    /// <summary>Makes a catalogue that is not loaded yet.</summary>
    /// <param name="store">Records.</param>
    /// <param name="reader">Reads revisions.</param>
    /// <param name="segmentPath">Segment file; null where none is wanted.</param>
    /// <param name="tell">Takes what an operator should know, a sentence each; null where nobody listens.</param>
    public CurrentCatalogue(ICatalogueStore store, IRevisionReader reader, string? segmentPath, Action<string>? tell = null)
    {
        Action<string> told = tell ?? (static _ => { });
        _store = store;
        _reader = new SnapshotReader(store, reader, told);
        _earlier = new EarlierVersions(_reader);
        _segments = new SegmentKeeping(segmentPath, told);
        _confirmation = new VersionConfirmation(store.ReadVersionAsync, _life.Token);
    }

    /// <summary>Reads the newest version: from the segment file as far as that is a true copy, the rest from the records.</summary>
    /// <param name="progress">Takes the number of revisions read.</param>
    /// <param name="cancellation">Ends the reading.</param>
    /// <exception cref="CatalogueUnavailableException">The records cannot be read.</exception>
    public Task LoadAsync(IProgress<long>? progress, CancellationToken cancellation) => TellingAsync(
        async () =>
        {
            await _refreshing.WaitAsync(cancellation);
            try
            {
                var copy = _segments.Path is { } path ? await _reader.ReadFileAsync(path, progress, cancellation) : null;
                var newest = copy is null ? await _reader.ReadNewestAsync(progress, cancellation) : await _reader.AdvanceAsync(copy, cancellation);
                if (copy is not null)
                {
                    _segments.Found(copy.Stamp);
                }

                _newest = newest;
                if (copy is null)
                {
                    InBackground(() => _segments.WriteAsync(newest, _life.Token));
                }

                return newest;
            }
            finally
            {
                _refreshing.Release();
            }
        },
        cancellation);

    /// <inheritdoc/>
    public Task<CatalogueSnapshot> CurrentAsync(long? leastVersion, CancellationToken cancellation) => TellingAsync(
        async () =>
        {
            for (var pause = FirstPause; ; pause = pause * 2 < LongestPause ? pause * 2 : LongestPause)
            {
                // The version first, the snapshot after: a snapshot taken before the version was read may lack what was committed in between.
                var snapshot = await ReachAsync(await _confirmation.ConfirmAsync(cancellation), cancellation);
                if (!(snapshot.Version < leastVersion))
                {
                    return snapshot;
                }

                await Task.Delay(pause, cancellation);
            }
        },
        cancellation);

    /// <summary>Brings the snapshot up to what was committed before the call, so that the next caller need not wait for it.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    /// <exception cref="CatalogueUnavailableException">The records cannot be read; what was committed is committed all the same.</exception>
    public Task RefreshAsync(CancellationToken cancellation) => CurrentAsync(leastVersion: null, cancellation);

    /// <inheritdoc/>
    /// <remarks>With names the snapshot has the policies as well: those known now, and those named (policies/…), as they were then.</remarks>
    public Task<CatalogueSnapshot?> AsOfAsync(long version, IReadOnlyCollection<string>? structures, CancellationToken cancellation) => TellingAsync(
        async () =>
        {
            if (await _store.FindVersionAsync(version, cancellation) is not { } stamp)
            {
                return null;
            }

            var newest = _newest is { } snapshot && Reaches(snapshot, stamp) ? snapshot : await CurrentAsync(leastVersion: null, cancellation);
            return await _earlier.AsOfAsync(stamp, structures, newest, cancellation);
        },
        cancellation);

    /// <summary>Ends all reading and merging and leaves a segment file of the newest snapshot. Calls that wait are told that the catalogue is gone.</summary>
    /// <param name="cancellation">Ends the writing; the file is then as it was.</param>
    public async Task StopAsync(CancellationToken cancellation)
    {
        await EndAsync();
        if (_newest is { } newest)
        {
            await _segments.WriteAsync(newest, cancellation);
        }
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await EndAsync();
        _segments.Dispose();
        _earlier.Dispose();
        _life.Dispose();
    }

    private async Task EndAsync()
    {
        await _life.CancelAsync();

        // Whoever refreshes may begin work in the background; once this is held nobody does.
        await _refreshing.WaitAsync(CancellationToken.None);
        _refreshing.Release();
        await _background;
    }

    /// <summary>The newest snapshot, brought up to a version that was read before.</summary>
    private async Task<CatalogueSnapshot> ReachAsync(VersionStamp stamp, CancellationToken cancellation)
    {
        if (_newest is { } snapshot && Reaches(snapshot, stamp))
        {
            return snapshot;
        }

        // The reading is not this caller's: it goes on for the others when he gives up.
        return await Task.Run(() => BringUpToAsync(stamp), CancellationToken.None).WaitAsync(cancellation);
    }

    private async Task<CatalogueSnapshot> BringUpToAsync(VersionStamp stamp)
    {
        await _refreshing.WaitAsync(_life.Token);
        try
        {
            var newest = _newest;
            if (newest is null || !Reaches(newest, stamp))
            {
                newest = newest is null ? await _reader.ReadNewestAsync(progress: null, _life.Token) : await _reader.AdvanceAsync(newest, _life.Token);
                _newest = newest;
                MergeWhereMany(newest);
            }

            return newest.Stamp.Timeline == stamp.Timeline && newest.Version < stamp.Version
                ? throw new CatalogueUnavailableException(string.Create(
                    CultureInfo.InvariantCulture, $"The records went back from version {stamp.Version} to {newest.Version}; check which database the service uses."))
                : newest;
        }
        finally
        {
            _refreshing.Release();
        }
    }

    /// <summary>Whether a snapshot has everything that a version has. A stamp of another timeline counts as newer: what it is of was read later.</summary>
    private static bool Reaches(CatalogueSnapshot snapshot, VersionStamp stamp) =>
        snapshot.Stamp == stamp || (snapshot.Stamp.Timeline == stamp.Timeline && snapshot.Version > stamp.Version);

    private void MergeWhereMany(CatalogueSnapshot snapshot)
    {
        if (snapshot.OverlayCount > Math.Max(FewRevised, snapshot.Count / RevisedShare))
        {
            InBackground(() => MergeAsync(snapshot));
        }
    }

    private async Task MergeAsync(CatalogueSnapshot from)
    {
        var merged = from.Merged();
        await _refreshing.WaitAsync(_life.Token);
        try
        {
            // Unless the catalogue was read anew in the meantime, what was revised since stands in the overlay and stays there.
            if (_newest is { } now && now.SharesSegmentWith(from))
            {
                _newest = now.Over(merged);
            }
        }
        finally
        {
            _refreshing.Release();
        }

        await _segments.WriteAsync(merged, _life.Token);
    }

    /// <summary>Begins work unless some is under way; called by whoever holds <see cref="_refreshing"/>.</summary>
    private void InBackground(Func<Task> work)
    {
        if (_background.IsCompleted && !_life.IsCancellationRequested)
        {
            _background = Task.Run(
                async () =>
                {
                    try
                    {
                        await work();
                    }
                    catch (OperationCanceledException) when (_life.IsCancellationRequested)
                    {
                        // Stopped: nothing depends on it.
                    }
                },
                CancellationToken.None);
        }
    }

    private static async Task<T> TellingAsync<T>(Func<Task<T>> work, CancellationToken cancellation)
    {
        try
        {
            return await work();
        }
        catch (StoreException trouble)
        {
            throw new CatalogueUnavailableException(trouble.Message, trouble);
        }
        catch (OperationCanceledException ended) when (!cancellation.IsCancellationRequested)
        {
            throw new CatalogueUnavailableException("The reading was broken off because the catalogue is being closed; ask again when the service is up.", ended);
        }
    }
}
