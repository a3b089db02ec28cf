using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Tests.Support;

namespace PermitScreen.Catalogue.Tests.Snapshots;

public sealed class EarlierVersionTests : IAsyncDisposable
{
    private readonly MemoryStore _store = new();
    private readonly CurrentCatalogue _catalogue;

    public EarlierVersionTests()
    {
        _catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        _store.Commit(("structures/A", "a1"), ("structures/B", "b1"), ("policies/p@1", "p1"));
        _store.Commit(("structures/A", "a2"), ("policies/p@1", null), ("policies/q@1", "q2"));
        _store.Commit(("structures/B", null), ("structures/C", "c3"));
        for (var i = 0; i < 6; i++)
        {
            _store.Commit(("structures/D", FormattableString.Invariant($"d{i}")));
        }
    }

    public ValueTask DisposeAsync() => _catalogue.DisposeAsync();

    [Fact]
    public async Task Every_version_can_be_had_whole()
    {
        for (var version = 1L; version <= _store.Newest; version++)
        {
            var snapshot = await _catalogue.AsOfAsync(version, null, CancellationToken.None);
            Assert.Equal(version, snapshot!.Version);
            Contents.AssertTrue(snapshot, _store);
        }
    }

    [Fact]
    public async Task There_is_no_version_before_the_first_or_after_the_newest()
    {
        Assert.Null(await _catalogue.AsOfAsync(0, null, CancellationToken.None));
        Assert.Null(await _catalogue.AsOfAsync(_store.Newest + 1, ["structures/A"], CancellationToken.None));
    }

    [Fact]
    public async Task The_last_four_are_kept()
    {
        await _catalogue.LoadAsync(progress: null, CancellationToken.None);
        Assert.Equal(1, _store.WholeReads);
        foreach (var version in (long[])[1, 2, 3, 4, 1, 2, 3, 4])
        {
            await _catalogue.AsOfAsync(version, null, CancellationToken.None);
        }

        Assert.Equal(5, _store.WholeReads);
        await _catalogue.AsOfAsync(5, null, CancellationToken.None);
        await _catalogue.AsOfAsync(4, null, CancellationToken.None);
        Assert.Equal(6, _store.WholeReads);
        await _catalogue.AsOfAsync(1, null, CancellationToken.None);
        Assert.Equal(7, _store.WholeReads);
        await _catalogue.AsOfAsync(_store.Newest, null, CancellationToken.None);
        Assert.Equal(7, _store.WholeReads);
    }

    [Fact]
    public async Task With_names_there_are_those_structures_and_the_policies()
    {
        await _catalogue.LoadAsync(progress: null, CancellationToken.None);
        var second = await _catalogue.AsOfAsync(2, ["structures/B", "structures/C", "structures/B"], CancellationToken.None);
        Assert.Equal(new Dictionary<string, string> { ["structures/B"] = "b1", ["policies/q@1"] = "q2" }, Contents.Of(second!));
        var first = await _catalogue.AsOfAsync(1, ["structures/A", "policies/p@1"], CancellationToken.None);
        Assert.Equal(new Dictionary<string, string> { ["structures/A"] = "a1", ["policies/p@1"] = "p1" }, Contents.Of(first!));
        var newest = await _catalogue.AsOfAsync(_store.Newest, ["structures/A", "structures/nowhere"], CancellationToken.None);
        Assert.Equal(new Dictionary<string, string> { ["structures/A"] = "a2", ["policies/q@1"] = "q2" }, Contents.Of(newest!));
        Assert.Equal(1, _store.WholeReads);
    }

    [Fact]
    public async Task A_revision_that_still_holds_is_shared_with_the_newest_snapshot()
    {
        var newest = await _catalogue.CurrentAsync(null, CancellationToken.None);
        var earlier = await _catalogue.AsOfAsync(2, null, CancellationToken.None);
        Assert.Same(newest.Find("structures/A"), earlier!.Find("structures/A"));
        var first = await _catalogue.AsOfAsync(1, ["structures/A"], CancellationToken.None);
        Assert.Equal("a1", first!.Find("structures/A")!.Prepared.Record.Title);
    }
}
