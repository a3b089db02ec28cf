using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Contract;

/// <summary>What every <see cref="IBacklogStore"/> must do.</summary>
public abstract class BacklogStoreContract
{
    private static CancellationToken None => CancellationToken.None;

    protected abstract Task<StoresUnderTest> OpenAsync();

    [Fact]
    public async Task Lines_come_with_the_revision_oldest_first_each_once_and_go_when_they_are_kept()
    {
        await using var stores = await OpenAsync();
        await stores.Catalogue.Done(Add(Structure("structures/b", "b", "1", "2"), minute: 5));
        await stores.Catalogue.Done(Add(Structure("structures/a", "a", "2", "3"), minute: 9));
        var pending = await stores.Backlog.ReadPendingAsync(10, None);
        Assert.Equal(new[] { "1", "2" }.Select(Line).ToHashSet(), pending.Take(2).Select(p => p.Key).ToHashSet());
        Assert.Equal(new PendingLines(Line("3"), "structures/a", Structure("x", "a").Hash, Start.AddMinutes(9), null), pending[2]);
        Assert.Equal(3, pending.Count);
        Assert.Equal("structures/b", pending.Single(p => p.Key == Line("2")).Structure);
        Assert.Equal(2, (await stores.Backlog.ReadPendingAsync(2, None)).Count);
        Assert.Equal((3L, Start.AddMinutes(5)), await Summary(stores));

        await stores.Backlog.StrikeAsync([Line("1"), Line("2"), Line("nobody's")], None);
        await stores.Backlog.StrikeAsync([Line("1")], None);
        await stores.Backlog.StrikeAsync([], None);
        Assert.Equal((1L, Start.AddMinutes(9)), await Summary(stores));
        await stores.Backlog.StrikeAsync([Line("3")], None);
        Assert.Equal((0L, null), await Summary(stores));
        Assert.Equal(3, (await stores.Backlog.ReadNamedAsync(None)).Count);
    }

    [Fact]
    public async Task A_failure_is_set_apart_and_tried_again_when_it_is_asked_for_again()
    {
        await using var stores = await OpenAsync();
        var content = Structure("structures/a", "a", "1");
        await stores.Catalogue.Done(Add(content));
        await stores.Backlog.NoteFailureAsync(Line("1"), "a mechanism: Ω", None);
        await stores.Backlog.NoteFailureAsync(Line("nobody's"), "x", None);
        Assert.Empty(await stores.Backlog.ReadPendingAsync(10, None));
        var (pending, oldest, failures) = await stores.Backlog.ReadSummaryAsync(10, None);
        Assert.Equal((0, null), (pending, oldest));
        Assert.Equal(new PendingLines(Line("1"), "structures/a", content.Hash, Start, "a mechanism: Ω"), Assert.Single(failures));
        Assert.Empty((await stores.Backlog.ReadSummaryAsync(0, None)).Failures);

        await stores.Backlog.RenewAsync("structures/a", content.Hash, [Line("1")], Start.AddHours(1), None);
        Assert.Equal(new PendingLines(Line("1"), "structures/a", content.Hash, Start.AddHours(1), null), Assert.Single(await stores.Backlog.ReadPendingAsync(10, None)));
    }

    [Fact]
    public async Task A_failed_line_that_the_next_revision_needs_too_is_tried_again()
    {
        await using var stores = await OpenAsync();
        await stores.Catalogue.Done(Add(Structure("structures/a", "1", "failed", "kept", "pending")));
        await stores.Backlog.StrikeAsync([Line("kept")], None);
        await stores.Backlog.NoteFailureAsync(Line("failed"), "a mechanism", None);
        var revised = Structure("structures/a", "2", "failed", "kept", "pending");
        await stores.Catalogue.Done(Revise(revised, Structure("x", "1").Hash.Etag, minute: 8));
        var pending = await stores.Backlog.ReadPendingAsync(10, None);
        Assert.Equal([Line("pending"), Line("failed")], pending.Select(p => p.Key));
        Assert.Equal(new PendingLines(Line("failed"), "structures/a", revised.Hash, Start.AddMinutes(8), null), pending[1]);
        Assert.Empty((await stores.Backlog.ReadSummaryAsync(10, None)).Failures);
    }

    [Fact]
    public async Task Renewed_addresses_replace_those_noted_before()
    {
        await using var stores = await OpenAsync();
        var content = Structure("structures/a", "a", "1", "2");
        await stores.Catalogue.Done(Add(content));
        await stores.Catalogue.Done(Add(Structure("structures/b", "b", "2")));
        await stores.Backlog.StrikeAsync([Line("1"), Line("2")], None);
        await stores.Backlog.RenewAsync("structures/a", content.Hash, [Line("1'"), Line("2'")], Start.AddHours(1), None);
        Assert.Equal(new[] { "1'", "2'", "2" }.Select(Line).ToHashSet(), await stores.Backlog.ReadNamedAsync(None));
        Assert.Equal(new[] { "1'", "2'" }.Select(Line).ToHashSet(), (await stores.Backlog.ReadPendingAsync(10, None)).Select(p => p.Key).ToHashSet());
        await stores.Backlog.RenewAsync("structures/none", Digest.Of([1]), [Line("x")], Start, None);
        Assert.DoesNotContain(Line("x"), await stores.Backlog.ReadNamedAsync(None));
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task Lines_of_earlier_revisions_stay_named_and_staged_ones_wait_for_publishing()
    {
        await using var stores = await OpenAsync();
        await stores.Catalogue.Done(Add(Structure("structures/a", "1", "old")));
        await stores.Catalogue.Done(Revise(Structure("structures/a", "2", "new"), Structure("x", "1").Hash.Etag));
        await stores.Imports.BeginAsync(Import("i1"), None);
        await stores.Imports.StageAsync("i1", Piece(0, Structure("structures/b", "3", "staged"), Structure("structures/a", "2", "new")), None);
        Assert.Equal(new[] { "old", "new", "staged" }.Select(Line).ToHashSet(), await stores.Backlog.ReadNamedAsync(None));
        Assert.Equal(new[] { "old", "new" }.Select(Line).ToHashSet(), (await stores.Backlog.ReadPendingAsync(10, None)).Select(p => p.Key).ToHashSet());
        await stores.Backlog.StrikeAsync([Line("old"), Line("new")], None);
        await stores.Imports.PublishAsync("i1", 1, By("pub", 7), None);
        Assert.Equal(new PendingLines(Line("staged"), "structures/b", Structure("x", "3").Hash, Start.AddMinutes(7), null), Assert.Single(await stores.Backlog.ReadPendingAsync(10, None)));
    }

    [Fact]
    public async Task The_version_of_the_mechanics_is_noted()
    {
        await using var stores = await OpenAsync();
        Assert.Null(await stores.Backlog.ReadMechanicsVersionAsync(None));
        await stores.Backlog.NoteMechanicsVersionAsync("1", None);
        await stores.Backlog.NoteMechanicsVersionAsync("2", None);
        Assert.Equal("2", await stores.Backlog.ReadMechanicsVersionAsync(None));
    }

    private static async Task<(long Pending, DateTimeOffset? Oldest)> Summary(StoresUnderTest stores)
    {
        var (pending, oldest, failures) = await stores.Backlog.ReadSummaryAsync(10, None);
        Assert.Empty(failures);
        return (pending, oldest);
    }
}
