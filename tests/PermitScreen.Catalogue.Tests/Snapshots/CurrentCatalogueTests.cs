using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Catalogue.Tests.Support;

namespace PermitScreen.Catalogue.Tests.Snapshots;

public sealed class CurrentCatalogueTests : IAsyncDisposable
{
    private readonly MemoryStore _store = new();
    private readonly PlainReader _reader = new();
    private readonly List<string> _told = [];
    private readonly CancellationTokenSource _end = new(TimeSpan.FromSeconds(60));
    private readonly CurrentCatalogue _catalogue;

    public CurrentCatalogueTests() => _catalogue = new CurrentCatalogue(_store, _reader, segmentPath: null, Tell);

    public async ValueTask DisposeAsync()
    {
        await _catalogue.DisposeAsync();
        _end.Dispose();
    }

    [Fact]
    public async Task Nothing_published_is_a_catalogue_of_nothing()
    {
        var snapshot = await _catalogue.CurrentAsync(null, _end.Token);
        Assert.Equal((0, 0), (snapshot.Version, snapshot.Count));
    }

    [Fact]
    public async Task What_is_added_revised_and_taken_out_is_followed_at_each_version()
    {
        var random = new Random(20260831);
        for (var i = 0; i < 300; i++)
        {
            _store.Commit([.. Enumerable.Range(0, random.Next(1, 6)).Select(_ => RandomName(random)).Distinct()
                .Select(name => (name, random.Next(4) == 0 ? null : FormattableString.Invariant($"content {random.Next(5)} of {name}")))]);
            if (random.Next(3) > 0)
            {
                Contents.AssertTrue(await _catalogue.CurrentAsync(null, _end.Token), _store);
            }
        }

        Assert.Equal(1, _store.WholeReads);
        Assert.Empty(_told);

        static string RandomName(Random random) => random.Next(5) == 0
            ? FormattableString.Invariant($"policies/p@{random.Next(4)}")
            : Contents.Structure(random.Next(40));
    }

    [Fact]
    public async Task Records_replaced_are_read_anew()
    {
        _store.Commit(("structures/A", "a"), ("structures/B", "b"), ("policies/p@1", "p"));
        Contents.AssertTrue(await _catalogue.CurrentAsync(null, _end.Token), _store);
        _store.Restore(("structures/B", "another b"), ("structures/C", "c"));
        var snapshot = await _catalogue.CurrentAsync(null, _end.Token);
        Contents.AssertTrue(snapshot, _store);
        Assert.Null(snapshot.Find("structures/A"));
        Assert.Empty(snapshot.Policies);
        Assert.Equal(2, _store.WholeReads);
        Assert.Contains(_told, t => t.Contains("replaced", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_change_that_the_store_does_not_tell_of_is_noticed_by_the_sum()
    {
        _store.Commit(("structures/A", "a"), ("structures/B", "b"));
        await _catalogue.CurrentAsync(null, _end.Token);
        _store.LeftOutOfChanges = "structures/A";
        _store.Commit(("structures/A", "another a"), ("structures/B", "another b"));
        Contents.AssertTrue(await _catalogue.CurrentAsync(null, _end.Token), _store);
        Assert.Equal(2, _store.WholeReads);
        Assert.Contains(_told, t => t.Contains("does not add up to version 2", StringComparison.Ordinal));
    }

    [Fact]
    public async Task Records_that_do_not_add_up_are_not_used()
    {
        _store.Commit(("structures/A", "a"), ("structures/B", "b"));
        _store.LeftOutOfWhole = "structures/A";
        var refused = await Assert.ThrowsAsync<CatalogueUnavailableException>(() => _catalogue.CurrentAsync(null, _end.Token));
        Assert.Contains("add up to catalogue version 1", refused.Message, StringComparison.Ordinal);
        _store.LeftOutOfWhole = null;
        Contents.AssertTrue(await _catalogue.CurrentAsync(null, _end.Token), _store);
    }

    [Fact]
    public async Task A_store_that_fails_is_told_and_recovered_from()
    {
        _store.Commit(("structures/A", "a"));
        _store.Trouble = new StoreException(StoreTrouble.Locked, "Another program holds the database; end it.");
        await Refused(() => _catalogue.LoadAsync(progress: null, _end.Token));
        await Refused(() => _catalogue.CurrentAsync(null, _end.Token));
        _store.Trouble = null;
        Assert.Equal(1, (await _catalogue.CurrentAsync(null, _end.Token)).Version);
        _store.Trouble = new StoreException(StoreTrouble.Locked, "Another program holds the database; end it.");
        await Refused(() => _catalogue.CurrentAsync(null, _end.Token));
        await Refused(() => _catalogue.RefreshAsync(_end.Token));
        await Refused(() => _catalogue.AsOfAsync(1, null, _end.Token));
        _store.Trouble = null;
        _store.Commit(("structures/A", "another a"));
        Contents.AssertTrue(await _catalogue.CurrentAsync(null, _end.Token), _store);

        async Task Refused(Func<Task> call)
        {
            var refused = await Assert.ThrowsAsync<CatalogueUnavailableException>(call);
            Assert.Equal("Another program holds the database; end it.", refused.Message);
            Assert.IsType<StoreException>(refused.InnerException);
        }
    }

    [Fact]
    public async Task A_refresh_makes_the_snapshot_ready_for_the_next_call()
    {
        _store.Commit(("structures/A", "a"));
        await _catalogue.LoadAsync(progress: null, _end.Token);
        var stale = await _catalogue.CurrentAsync(null, _end.Token);
        _store.Commit(("structures/A", "b"));
        await _catalogue.RefreshAsync(_end.Token);
        var first = await _catalogue.CurrentAsync(null, _end.Token);
        Assert.Same(first, await _catalogue.CurrentAsync(null, _end.Token));
        Assert.Equal((1, 2), (stale.Version, first.Version));
        Assert.Equal("a", stale.Find("structures/A")!.Prepared.Record.Title);
    }

    [Fact]
    public async Task A_closed_catalogue_says_so()
    {
        _store.Commit(("structures/A", "a"));
        await _catalogue.LoadAsync(progress: null, _end.Token);
        _store.BeforeAnswer = () => new TaskCompletionSource().Task;
        var waiting = _catalogue.CurrentAsync(null, _end.Token);
        await _catalogue.StopAsync(_end.Token);
        var refused = await Assert.ThrowsAsync<CatalogueUnavailableException>(() => waiting);
        Assert.Contains("closed", refused.Message, StringComparison.Ordinal);
    }

    private void Tell(string message)
    {
        lock (_told)
        {
            _told.Add(message);
        }
    }
}
