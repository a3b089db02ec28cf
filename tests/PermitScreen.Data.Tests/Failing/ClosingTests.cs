using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Failing;

/// <summary>What happens when records are closed, and what is found when they are opened again.</summary>
public sealed class ClosingTests : IDisposable
{
    private readonly TestFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Closing_waits_for_the_write_that_is_running()
    {
        var probe = new ClosingProbe();
        var records = SqliteStores.Open(_folder.Path, probe);
        probe.Records = records;
        Assert.Equal(1, await records.Catalogue.Done(Add(Structure("structures/a", "a"))));
        Assert.False(probe.ClosedTooEarly);
        await probe.Closing!;
        await Assert.ThrowsAsync<ObjectDisposedException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/b", "b")), CancellationToken.None));
        await using var again = SqliteStores.Open(_folder.Path);
        Assert.Equal("structures/a=a", await again.Catalogue.Text(1));
    }

    [Fact]
    public async Task What_a_process_left_behind_is_removed_and_nothing_else()
    {
        string[] left = ["backup-1.tmp", "backup-1.tmp.part", "backup-1.tmp.part-journal", "restore-1.tmp", "catalogue.checking", "catalogue.checking-wal", "catalogue.restoring"];
        string[] others = ["backup-1.db", "replaced-1.db", "notes.tmp", "catalogue.segment"];
        foreach (var name in left.Concat(others))
        {
            await File.WriteAllTextAsync(_folder.File(name), "x");
        }

        await using var records = SqliteStores.Open(_folder.Path);
        Assert.All(left, name => Assert.False(File.Exists(_folder.File(name)), name));
        Assert.All(others, name => Assert.True(File.Exists(_folder.File(name)), name));
    }

    /// <summary>SQLite's text functions end a text at this character, so that two names could be taken for one.</summary>
    [Fact]
    public async Task Text_with_the_character_zero_reaches_no_statement()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/a\0b", "a")), CancellationToken.None));
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/a", "a")) with { Provenance = By("a", reason: "\0") }, CancellationToken.None));
        Assert.Equal(0, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        Assert.Equal(1, await records.Catalogue.Done(Add(Structure("structures/a", "a"))));
        Assert.Equal([], await records.Keeping.Problems());
    }

    /// <summary>Begins to close the records in the middle of a transaction.</summary>
    private sealed class ClosingProbe : IStoreProbe
    {
        public SqliteRecords? Records { get; set; }

        public Task? Closing { get; private set; }

        public bool ClosedTooEarly { get; private set; }

        public void Reached(StoreMoment moment, string what)
        {
            if (moment == StoreMoment.InsideTransaction && Records is { } records)
            {
                Closing = Task.Run(async () => await records.DisposeAsync());

                // Closing can only end once this returns; the wait gives it the time to end too early.
                ClosedTooEarly = Closing.Wait(TimeSpan.FromMilliseconds(300));
            }
        }
    }
}
