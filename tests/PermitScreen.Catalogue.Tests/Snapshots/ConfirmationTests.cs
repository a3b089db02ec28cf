using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Tests.Support;

namespace PermitScreen.Catalogue.Tests.Snapshots;

/// <summary>A current answer is proved by a read of the version that was issued after the call arrived.</summary>
public sealed class ConfirmationTests : IDisposable
{
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(30);

    private readonly MemoryStore _store = new();
    private readonly CancellationTokenSource _end = new(Patience);

    public void Dispose() => _end.Dispose();

    [Fact]
    public async Task A_read_that_was_issued_before_a_call_does_not_serve_it()
    {
        _store.Commit(("structures/A", "first"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        await catalogue.LoadAsync(progress: null, _end.Token);
        var looked = new TaskCompletionSource();
        var answer = new TaskCompletionSource();
        _store.BeforeAnswer = () =>
        {
            _store.BeforeAnswer = null;
            looked.SetResult();
            return answer.Task;
        };
        var early = catalogue.CurrentAsync(null, _end.Token);
        await looked.Task.WaitAsync(Patience);
        _store.Commit(("structures/A", "second"));
        var late = catalogue.CurrentAsync(null, _end.Token);
        Assert.False(late.IsCompleted);
        answer.SetResult();
        Assert.InRange((await early).Version, 1, 2);
        Assert.Equal("second", (await late).Find("structures/A")!.Prepared.Record.Title);
        Assert.Equal(2, (await late).Version);
    }

    [Fact]
    public async Task One_read_serves_all_calls_that_wait_for_it()
    {
        const int Calls = 200;
        _store.Commit(("structures/A", "first"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        await catalogue.LoadAsync(progress: null, _end.Token);
        var before = _store.VersionReads;
        var answer = new TaskCompletionSource();
        var looked = new TaskCompletionSource();
        _store.BeforeAnswer = () =>
        {
            looked.TrySetResult();
            return answer.Task;
        };
        var first = catalogue.CurrentAsync(null, _end.Token);
        await looked.Task.WaitAsync(Patience);
        var others = Enumerable.Range(0, Calls).Select(_ => catalogue.CurrentAsync(null, _end.Token)).ToArray();
        answer.SetResult();
        await Task.WhenAll([first, .. others]);
        Assert.Equal(2, _store.VersionReads - before);
        Figures.Note("snapshots.confirmation[calls served by two reads]", Calls + 1);
    }

    [Fact]
    public async Task A_caller_that_gives_up_does_not_end_the_read_of_the_others()
    {
        _store.Commit(("structures/A", "first"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        await catalogue.LoadAsync(progress: null, _end.Token);
        var answer = new TaskCompletionSource();
        _store.BeforeAnswer = () => answer.Task;
        using var own = new CancellationTokenSource();
        var impatient = catalogue.CurrentAsync(null, own.Token);
        var patient = catalogue.CurrentAsync(null, _end.Token);
        await own.CancelAsync();
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => impatient);
        answer.SetResult();
        Assert.Equal(1, (await patient).Version);
    }

    /// <summary>Writers that tell nobody, readers that know what was committed before they asked; one structure changes with every version.</summary>
    [Fact]
    public async Task No_answer_is_older_than_what_was_committed_before_the_call()
    {
        const int Commits = 1_000;
        _store.Commit([("structures/hot", "1"), .. Enumerable.Range(0, 500).Select(i => (Contents.Structure(i), (string?)"cold"))]);
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        await catalogue.LoadAsync(progress: null, _end.Token);

        // An answer takes a while, as over a network: commits fall into it.
        _store.BeforeAnswer = () => Task.Delay(1);
        var writing = true;
        var (answers, overlapped) = (0, 0);
        var writers = Enumerable.Range(0, 2).Select(_ => Task.Run(async () =>
        {
            for (var i = 0; i < Commits / 2; i++)
            {
                lock (_store)
                {
                    _store.Commit(("structures/hot", FormattableString.Invariant($"{_store.Newest + 1}")));
                }

                await Task.Delay(1, _end.Token);
            }
        })).ToArray();
        var readers = Enumerable.Range(0, 4).Select(_ => Task.Run(async () =>
        {
            while (Volatile.Read(ref writing))
            {
                var committed = _store.Newest;
                var snapshot = await catalogue.CurrentAsync(null, _end.Token);
                Assert.True(snapshot.Version >= committed, $"Committed {committed}, answered {snapshot.Version}.");
                Assert.Equal(FormattableString.Invariant($"{snapshot.Version}"), snapshot.Find("structures/hot")!.Prepared.Record.Title);
                Interlocked.Increment(ref answers);
                Interlocked.Add(ref overlapped, _store.Newest > committed ? 1 : 0);
            }
        })).ToArray();
        await Task.WhenAll(writers);
        Volatile.Write(ref writing, value: false);
        await Task.WhenAll(readers);
        Assert.True(overlapped >= 100, $"Only {overlapped} calls overlapped a commit.");
        Figures.Note("snapshots.confirmation[answers while revised]", answers);
        Figures.Note("snapshots.confirmation[answers that overlapped a commit]", overlapped);
    }

    [Fact]
    public async Task A_least_version_is_waited_for()
    {
        _store.Commit(("structures/A", "1"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        var waiting = catalogue.CurrentAsync(leastVersion: 3, _end.Token);
        Assert.Equal(1, (await catalogue.CurrentAsync(leastVersion: 1, _end.Token)).Version);
        _store.Commit(("structures/A", "2"));
        Assert.Equal(2, (await catalogue.CurrentAsync(leastVersion: null, _end.Token)).Version);
        Assert.False(waiting.IsCompleted);
        _store.Commit(("structures/A", "3"));
        Assert.Equal(3, (await waiting).Version);
        using var own = new CancellationTokenSource();
        var vain = catalogue.CurrentAsync(leastVersion: 4, own.Token);
        await own.CancelAsync();
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => vain);
    }
}
