using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Tests.Support;

namespace PermitScreen.Catalogue.Tests.Snapshots;

/// <summary>The overlay is put into the bulk in the background while revisions go on; nothing gets lost on the way.</summary>
public sealed class MergeTests : IDisposable
{
    private readonly string _folder = Directory.CreateTempSubdirectory("permitscreen-merge-").FullName;
    private readonly MemoryStore _store = new();
    private readonly CancellationTokenSource _end = new(TimeSpan.FromSeconds(300));

    public void Dispose()
    {
        Directory.Delete(_folder, recursive: true);
        _end.Dispose();
    }

    [Fact]
    public async Task Nothing_is_lost_while_four_writers_go_on()
    {
        const int Writers = 4;
        const int Each = 1_000;
        const int Names = 1_500;
        _store.Commit([.. Enumerable.Range(0, Names / 2).Select(i => (Contents.Structure(i), (string?)"first"))]);
        var catalogue = new CurrentCatalogue(_store, new PlainReader(), Path.Combine(_folder, "segment"));
        await catalogue.LoadAsync(progress: null, _end.Token);
        var (merges, looked) = (0, 0);
        var writing = Task.WhenAll(Enumerable.Range(0, Writers).Select(w => Task.Run(async () =>
        {
            var random = new Random(w);
            for (var i = 0; i < Each; i++)
            {
                var name = random.Next(20) == 0 ? FormattableString.Invariant($"policies/p@{random.Next(9)}") : Contents.Structure(random.Next(Names));
                _store.Commit((name, random.Next(6) == 0 ? null : FormattableString.Invariant($"{w} {i}")));
                await catalogue.RefreshAsync(_end.Token);
            }
        })));
        var overlay = 0;
        while (!writing.IsCompleted)
        {
            var snapshot = await catalogue.CurrentAsync(null, _end.Token);
            merges += snapshot.OverlayCount < overlay / 2 ? 1 : 0;
            overlay = snapshot.OverlayCount;
            Assert.Equal(snapshot.Stamp.State, snapshot.Sum);
            if (looked++ % 10 == 0)
            {
                Contents.AssertTrue(snapshot, _store);
            }
        }

        await writing;
        var last = await catalogue.CurrentAsync(null, _end.Token);
        Assert.Equal(1 + (Writers * Each), last.Version);
        Contents.AssertTrue(last, _store);
        Assert.Equal(1, _store.WholeReads);
        Assert.True(merges > 0, "No merge was seen.");
        await catalogue.StopAsync(_end.Token);
        await catalogue.DisposeAsync();
        Figures.Note("snapshots.merge[revisions]", Writers * Each);
        Figures.Note("snapshots.merge[merges seen]", merges);
        Figures.Note("snapshots.merge[snapshots compared with the records]", looked / 10);
    }

    [Fact]
    public async Task What_was_made_ready_stays_ready_through_a_merge()
    {
        _store.Commit([.. Enumerable.Range(0, 600).Select(i => (Contents.Structure(i), (string?)"first"))]);
        var reader = new PlainReader();
        await using var catalogue = new CurrentCatalogue(_store, reader, segmentPath: null);
        var before = await catalogue.CurrentAsync(null, _end.Token);
        Assert.Equal("first", before.Find(Contents.Structure(7))!.Prepared.Record.Title);
        _store.Commit([.. Enumerable.Range(100, 300).Select(i => (Contents.Structure(i), (string?)"second"))]);
        Assert.Equal("second", (await catalogue.CurrentAsync(null, _end.Token)).Find(Contents.Structure(200))!.Prepared.Record.Title);
        Assert.Equal(2, reader.Reads);
        CatalogueSnapshot merged;
        while ((merged = await catalogue.CurrentAsync(null, _end.Token)).OverlayCount > 0)
        {
            await Task.Delay(5, _end.Token);
        }

        Assert.Equal("first", merged.Find(Contents.Structure(7))!.Prepared.Record.Title);
        Assert.Equal("second", merged.Find(Contents.Structure(200))!.Prepared.Record.Title);
        Assert.Equal(2, reader.Reads);
        Contents.AssertTrue(merged, _store);
    }
}
