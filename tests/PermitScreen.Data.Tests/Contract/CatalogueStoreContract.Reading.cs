using System.Text;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Contract;

/// <content>Pages, cancellation, and what comes back as it was put in.</content>
public abstract partial class CatalogueStoreContract
{
    [Fact]
    public async Task Pages_of_change_sets_and_audit_entries_join_without_a_gap()
    {
        await using var stores = await OpenAsync();
        var store = stores.Catalogue;
        for (var i = 0; i < 25; i++)
        {
            await store.Done(Add(Structure(Name(i), "x"), minute: i));
        }

        var (versions, sequences) = (new List<long>(), new List<long>());
        for (long? before = null; ;)
        {
            var page = await store.ReadChangeSetsAsync(before, 7, None);
            versions.AddRange(page.Select(c => c.Version));
            if (page.Count == 0)
            {
                break;
            }

            before = page[^1].Version;
        }

        for (long? before = null; ;)
        {
            var page = await store.ReadAuditAsync(before, 7, None);
            sequences.AddRange(page.Select(c => c.Sequence));
            if (page.Count == 0)
            {
                break;
            }

            before = page[^1].Sequence;
        }

        Assert.Equal(Enumerable.Range(1, 25).Reverse().Select(v => (long)v), versions);
        Assert.Equal(Enumerable.Range(1, 26).Reverse().Select(v => (long)v), sequences);
        var newest = Assert.Single(await store.ReadAuditAsync(null, 1, None));
        Assert.Equal((26, "create structure", Name(24), 25L), (newest.Sequence, newest.Action, newest.Subject, newest.Version));
        var set = Assert.Single(await store.ReadChangeSetsAsync(null, 1, None));
        Assert.Equal((25L, 1, 0, 0, newest.Provenance), (set.Version, set.Added, set.Revised, set.Removed, set.Provenance));
        Assert.Empty(await store.ReadChangeSetsAsync(null, 0, None));
        Assert.Empty(await store.ReadAuditAsync(1, 5, None));
    }

    [Fact]
    public async Task A_wait_for_other_writers_ends_when_it_is_cancelled_and_nothing_is_written()
    {
        await using var stores = await OpenAsync();
        using var cancelled = new CancellationTokenSource();
        await cancelled.CancelAsync();
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => stores.Catalogue.CommitAsync(Add(Structure("structures/a", "x")), cancelled.Token));
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => stores.Catalogue.ReadVersionAsync(cancelled.Token));
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => stores.Catalogue.ReadHistoryAsync(ResourceKind.Structure, "structures/a", cancelled.Token));
        Assert.Equal(0, (await stores.Catalogue.ReadVersionAsync(None)).Version);
        Assert.Equal(1, await stores.Catalogue.Done(Add(Structure("structures/a", "x"))));
    }

    [Fact]
    public async Task Reading_can_be_given_up_in_the_middle_and_by_many_at_once()
    {
        await using var stores = await OpenAsync();
        for (var i = 0; i < 50; i++)
        {
            await stores.Catalogue.Done(Add(Structure(Name(i), "x")));
        }

        await Task.WhenAll(Enumerable.Range(0, 40).Select(n => Task.Run(async () =>
        {
            var read = 0;
            await foreach (var _ in stores.Catalogue.ReadAsync(50, None))
            {
                if (++read == n)
                {
                    break;
                }
            }

            using var stop = new CancellationTokenSource();
            await Assert.ThrowsAnyAsync<OperationCanceledException>(async () =>
            {
                await foreach (var _ in stores.Catalogue.ReadAsync(50, stop.Token))
                {
                    await stop.CancelAsync();
                }
            });
        })));
        Assert.Equal(51, await stores.Catalogue.Done(Add(Structure(Name(50), "x"))));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(1_000_000)]
    public async Task Contents_of_any_size_come_back_as_they_were(int length)
    {
        await using var stores = await OpenAsync();
        var bytes = new byte[length];
        new Random(1).NextBytes(bytes);
        var content = new ResourceContent(ResourceKind.Structure, "structures/a", bytes, []);
        await stores.Catalogue.Done(Add(content));
        var found = await stores.Catalogue.FindAsync(ResourceKind.Structure, "structures/a", 1, None);
        Assert.True(found!.Content.Span.SequenceEqual(bytes));
        Assert.Equal(content.Hash, found.Head.Content);
        Assert.True(Assert.Single(await stores.Catalogue.All(1)).Content.Span.SequenceEqual(bytes));
    }

    [Fact]
    public async Task Words_in_any_script_and_instants_to_the_millisecond_come_back()
    {
        await using var stores = await OpenAsync();
        const string Actor = "Žaneta Ōe 東京 🌉";
        const string Reason = "l'épreuve\n\"α ≥ β\" \u0001 ﬀ";
        var instant = new DateTimeOffset(2026, 7, 4, 23, 59, 59, TimeSpan.FromHours(5)).AddTicks(1_239_999);
        var content = new ResourceContent(ResourceKind.Structure, "structures/a", Encoding.UTF8.GetBytes(Actor), []);
        await stores.Catalogue.Done(new ChangeRequest("create structure", new Edit.Add(content), new Provenance(Actor, Reason, instant), null));
        var kept = new Provenance(Actor, Reason, new DateTimeOffset(2026, 7, 4, 18, 59, 59, 123, TimeSpan.Zero));
        Assert.Equal(kept, (await stores.Catalogue.FindAsync(ResourceKind.Structure, "structures/a", 1, None))!.Head.Provenance);
        Assert.Equal(kept, Assert.Single(await stores.Catalogue.ReadChangeSetsAsync(null, 5, None)).Provenance);
        Assert.Equal(kept, (await stores.Catalogue.ReadAuditAsync(null, 5, None))[0].Provenance);
        Assert.Equal(TimeSpan.Zero, (await stores.Catalogue.ReadAuditAsync(null, 5, None))[0].Provenance.Instant.Offset);
    }

    [Fact]
    public async Task Kinds_are_kept_apart_and_come_in_order_of_kind_and_name()
    {
        await using var stores = await OpenAsync();
        string[] names = ["structures/b", "structures/B", "structures/a.1", "structures/a-1", "structures/A", "structures/a"];
        foreach (var name in names)
        {
            await stores.Catalogue.Done(Add(Structure(name, "x")));
        }

        await stores.Catalogue.Done(Add(Policy("policies/p@1", "x")));
        await stores.Catalogue.Done(Add(new ResourceContent(ResourceKind.Policy, "structures/a", new byte[] { 1 }, [])));
        var found = (await stores.Catalogue.All(8)).Select(r => (r.Head.Kind, r.Head.Name)).ToList();
        Assert.Equal(found.OrderBy(n => n.Kind).ThenBy(n => n.Name, StringComparer.Ordinal), found);
        Assert.Equal(8, found.Count);
        Assert.Equal(8, (await stores.Catalogue.FindAsync(ResourceKind.Policy, "structures/a", 8, None))!.Head.FromVersion);
        Assert.Null(await stores.Catalogue.FindAsync(ResourceKind.Policy, "structures/b", 8, None));
        Assert.Empty(await stores.Catalogue.ReadHistoryAsync(ResourceKind.Policy, "structures/b", None));
    }
}
