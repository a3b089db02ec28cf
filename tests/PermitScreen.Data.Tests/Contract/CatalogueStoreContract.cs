using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Contract;

/// <summary>What every <see cref="ICatalogueStore"/> must do.</summary>
public abstract partial class CatalogueStoreContract
{
    private static CancellationToken None => CancellationToken.None;

    protected abstract Task<StoresUnderTest> OpenAsync();

    [Fact]
    public async Task Empty_records_are_version_0_and_say_who_made_them()
    {
        await using var stores = await OpenAsync();
        var stamp = await stores.Catalogue.ReadVersionAsync(None);
        Assert.Equal(0, stamp.Version);
        Assert.NotEqual(Guid.Empty, stamp.Timeline);
        Assert.Equal(default, stamp.State);
        Assert.Equal(stamp, await stores.Catalogue.FindVersionAsync(0, None));
        Assert.Null(await stores.Catalogue.FindVersionAsync(1, None));
        Assert.Null(await stores.Catalogue.FindVersionAsync(-1, None));
        Assert.Empty(await stores.Catalogue.All(0));
        Assert.Empty(await stores.Catalogue.ReadChangeSetsAsync(null, 10, None));
        var entry = Assert.Single(await stores.Catalogue.ReadAuditAsync(null, 10, None));
        Assert.Equal((1, "create records", null), (entry.Sequence, entry.Action, entry.Version));
        Assert.Equal(Start, entry.Provenance.Instant);
        Assert.Equal(Digest.Of([]), entry.Records);
    }

    [Fact]
    public async Task A_resource_is_added_revised_taken_out_and_added_again_and_every_version_stays_as_it_was()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        var (one, two) = (Structure("structures/a", "one"), Structure("structures/a", "two"));
        Assert.Equal(1, await store.Done(Add(one)));
        Assert.Equal(2, await store.Done(Revise(two, one.Hash.Etag, minute: 1)));
        Assert.Equal(3, await store.Done(Revise(one, two.Hash.Etag, minute: 2)));
        Assert.Equal(4, await store.Done(Remove(ResourceKind.Structure, "structures/a", one.Hash.Etag, minute: 3)));
        Assert.Equal(5, await store.Done(Add(Structure("structures/b", "b"))));
        Assert.Equal(6, await store.Done(Add(one, minute: 4)));

        string[] expected = ["", "structures/a=one", "structures/a=two", "structures/a=one", "", "structures/b=b", "structures/a=one structures/b=b"];
        for (var version = 0; version < expected.Length; version++)
        {
            Assert.Equal(expected[version], await store.Text(version));
            var found = await store.FindAsync(ResourceKind.Structure, "structures/a", version, None);
            Assert.Equal((await store.All(version)).SingleOrDefault(r => r.Head.Name == "structures/a")?.Head, found?.Head);
        }

        var history = await store.ReadHistoryAsync(ResourceKind.Structure, "structures/a", None);
        Assert.Equal([(6L, null), (3L, 4L), (2L, 3L), (1L, (long?)2L)], history.Select(h => (h.FromVersion, h.ToVersion)));
        Assert.Equal(["ann", "ben", "ben", "ann"], history.Select(h => h.Provenance.Actor));
        Assert.Equal([Start.AddMinutes(4), Start.AddMinutes(2), Start.AddMinutes(1), Start], history.Select(h => h.Provenance.Instant));
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task What_stands_against_a_change_is_told_and_nothing_is_written()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        var one = Structure("structures/a", "one");
        await store.Done(Add(one));
        var before = await store.ReadVersionAsync(None);

        var exists = Assert.IsType<ChangeOutcome.Exists>(await store.CommitAsync(Add(Structure("structures/a", "other")), None));
        Assert.Equal(1, exists.Newest.FromVersion);
        Assert.IsType<ChangeOutcome.Missing>(await store.CommitAsync(Revise(Structure("structures/b", "b"), "0"), None));
        Assert.IsType<ChangeOutcome.Missing>(await store.CommitAsync(Remove(ResourceKind.Structure, "structures/b", "0"), None));
        Assert.IsType<ChangeOutcome.Missing>(await store.CommitAsync(Remove(ResourceKind.Policy, "structures/a", one.Hash.Etag), None));
        var outdated = Assert.IsType<ChangeOutcome.Outdated>(await store.CommitAsync(Revise(Structure("structures/a", "two"), "000000000000000000000000"), None));
        Assert.Equal(one.Hash, outdated.Newest.Content);
        Assert.IsType<ChangeOutcome.Outdated>(await store.CommitAsync(Remove(ResourceKind.Structure, "structures/a", "x"), None));
        var unchanged = Assert.IsType<ChangeOutcome.Unchanged>(await store.CommitAsync(Revise(one, one.Hash.Etag, "r1"), None));
        Assert.Equal((1L, 1L), (unchanged.Newest.FromVersion, unchanged.Version));

        Assert.Equal(before, await store.ReadVersionAsync(None));
        Assert.Equal(2, (await store.ReadAuditAsync(null, 10, None)).Count);
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task A_request_sent_again_gives_the_first_answer_and_another_one_under_its_id_is_refused()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        var (one, two) = (Structure("structures/a", "one"), Structure("structures/a", "two"));
        var add = Add(one, "r-add");
        var revise = Revise(two, one.Hash.Etag, "r-revise");
        var remove = Remove(ResourceKind.Structure, "structures/a", two.Hash.Etag, "r-remove");
        foreach (var request in new[] { add, revise, remove })
        {
            Assert.False(Assert.IsType<ChangeOutcome.Done>(await store.CommitAsync(request, None)).Repeated);
        }

        Assert.Equal(new ChangeOutcome.Done(1, one.Hash, Repeated: true), await store.CommitAsync(add, None));
        Assert.Equal(new ChangeOutcome.Done(2, two.Hash, Repeated: true), await store.CommitAsync(revise, None));
        Assert.Equal(new ChangeOutcome.Done(3, null, Repeated: true), await store.CommitAsync(remove, None));
        Assert.IsType<ChangeOutcome.RequestIdReused>(await store.CommitAsync(Add(Structure("structures/z", "z"), "r-add"), None));
        Assert.Equal(3, (await store.ReadVersionAsync(None)).Version);
    }

    [Fact]
    public async Task A_request_sent_by_many_at_once_is_done_once()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        var outcomes = await Task.WhenAll(Enumerable.Range(0, 200).Select(i => Task.Run(() => store.CommitAsync(Add(Structure(Name(i % 20), "x"), FormattableString.Invariant($"r{i % 20}")), None))));
        var done = outcomes.Cast<ChangeOutcome.Done>().ToList();
        Assert.Equal(20, done.Count(d => !d.Repeated));
        Assert.Equal(20, done.Select(d => d.Version).Distinct().Count());
        Assert.Equal(20, (await store.ReadVersionAsync(None)).Version);
    }

    [Fact]
    public async Task Versions_are_in_the_order_of_commits_under_eight_writers_and_readers_never_see_a_half()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        var newestKnown = 0L;
        using var over = new CancellationTokenSource();
        var reader = Task.Run(async () =>
        {
            var reads = 0;
            do
            {
                var known = Interlocked.Read(ref newestKnown);
                var stamp = await store.ReadVersionAsync(None);
                Assert.True(stamp.Version >= known);
                Assert.Equal(stamp.Version, (await store.All(stamp.Version)).Count);
                Assert.Equal(stamp, await store.FindVersionAsync(stamp.Version, None));
                reads++;
            }
            while (!over.IsCancellationRequested);

            return reads;
        });
        await Task.WhenAll(Enumerable.Range(0, 8).Select(writer => Task.Run(async () =>
        {
            var last = 0L;
            for (var i = 0; i < 40; i++)
            {
                var version = await store.Done(Add(Structure(Name((writer * 1000) + i), "x")));
                Assert.True(version > last);
                last = version;
                for (var known = Interlocked.Read(ref newestKnown); known < version; known = Interlocked.Read(ref newestKnown))
                {
                    Interlocked.CompareExchange(ref newestKnown, version, known);
                }
            }
        })));
        await over.CancelAsync();
        Assert.True(await reader > 0);
        Assert.Equal(320, (await store.ReadVersionAsync(None)).Version);
        Assert.Equal(Enumerable.Range(1, 320).Select(v => (long)v).Reverse(), (await store.ReadChangeSetsAsync(null, 1000, None)).Select(c => c.Version));
        Assert.Equal([], await stores.Keeping.Problems());
    }

    [Fact]
    public async Task Changes_after_any_version_lead_from_its_state_to_the_newest()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        await store.Done(Add(Structure("structures/a", "a1")));
        await store.Done(Add(Structure("structures/b", "b1")));
        await store.Done(Add(Policy("policies/p@1", "p1")));
        await store.Done(Revise(Structure("structures/a", "a2"), Structure("structures/a", "a1").Hash.Etag));
        await store.Done(Remove(ResourceKind.Structure, "structures/b", Structure("structures/b", "b1").Hash.Etag));
        await store.Done(Add(Structure("structures/c", "c1")));
        await store.Done(Remove(ResourceKind.Structure, "structures/c", Structure("structures/c", "c1").Hash.Etag));
        await store.Done(Revise(Structure("structures/a", "a1"), Structure("structures/a", "a2").Hash.Etag));
        for (var after = 0L; after <= 8; after++)
        {
            var changes = await store.ReadChangesAsync(after, None);
            var held = (await store.All(after)).ToDictionary(r => (r.Head.Kind, r.Head.Name));
            foreach (var gone in changes.Gone)
            {
                Assert.True(held.Remove(gone));
            }

            foreach (var begun in changes.Began)
            {
                Assert.True(begun.Head.FromVersion > after);
                held[(begun.Head.Kind, begun.Head.Name)] = begun;
            }

            Assert.Equal(await store.ReadVersionAsync(None), changes.Stamp);
            Assert.Equal(
                (await store.All(8)).Select(r => (r.Head.Name, r.Head.FromVersion)), held.Values.Select(r => (r.Head.Name, r.Head.FromVersion)).OrderBy(n => n.Name[0] == 'p').ThenBy(n => n.Name, StringComparer.Ordinal));
            Assert.Equal((await store.All(8)).Aggregate(default(StateSum), (s, r) => s.With(r.Head)), changes.Stamp.State);
        }

        Assert.Equal((ResourceKind.Structure, "structures/b"), Assert.Single((await store.ReadChangesAsync(2, None)).Gone));
        await Assert.ThrowsAsync<StoreException>(() => store.ReadChangesAsync(9, None));
        await Assert.ThrowsAsync<StoreException>(() => store.All(9));
    }
}
