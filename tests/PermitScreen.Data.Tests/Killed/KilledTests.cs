using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Killed;

/// <summary>A process that ends at any moment leaves all of a change or nothing of it.</summary>
public sealed class KilledTests : IDisposable
{
    private readonly TestFolder _folder = new();
    private readonly TestFolder _photographs = new();

    public void Dispose()
    {
        _folder.Dispose();
        _photographs.Dispose();
    }

    [Fact]
    public async Task In_a_migration()
    {
        var probe = new PhotographingProbe(_folder.Path, _photographs.Path);
        await using (SqliteStores.Open(_folder.Path, probe))
        {
            Assert.All(probe.Taken, t => Assert.Equal(StoreMoment.InMigration, t.Moment));
        }

        Assert.True(probe.Taken.Count > 20);
        foreach (var (_, _, folder) in probe.Taken)
        {
            await using var records = SqliteStores.Open(folder);
            Assert.Equal(0, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
            Assert.Single(await records.Catalogue.ReadAuditAsync(null, 10, CancellationToken.None));
            Assert.Equal([], await records.Keeping.Problems());
        }
    }

    [Fact]
    public async Task In_changes_and_imports_with_the_request_sent_again()
    {
        var probe = new PhotographingProbe(_folder.Path, _photographs.Path);
        await using (var records = SqliteStores.Open(_folder.Path, probe))
        {
            await Work(records);
        }

        var expected = new List<string>();
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            for (var version = 0; version <= 4; version++)
            {
                expected.Add(await records.Catalogue.Text(version));
            }
        }

        foreach (var (moment, what, folder) in probe.Taken.Where(t => t.Moment is StoreMoment.InsideTransaction or StoreMoment.AfterCommit))
        {
            await using var records = SqliteStores.Open(folder);
            Assert.Equal([], await records.Keeping.Problems());
            var version = (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version;
            Assert.Equal(expected[(int)version], await records.Catalogue.Text(version));

            // The caller knows nothing of the last step, and does everything again.
            await Work(records);
            Assert.True((await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version == 4, $"{moment} {what}");
            for (var v = 0; v <= 4; v++)
            {
                Assert.Equal(expected[v], await records.Catalogue.Text(v));
            }

            Assert.Equal([], await records.Keeping.Problems());
        }

        Assert.Equal(14, probe.Taken.Count(t => t.Moment is StoreMoment.InsideTransaction or StoreMoment.AfterCommit));
    }

    [Fact]
    public async Task An_error_before_the_commit_leaves_nothing_and_one_after_it_everything()
    {
        var probe = new ThrowingProbe(null);
        await using var records = SqliteStores.Open(_folder.Path, probe);
        probe.At = StoreMoment.InsideTransaction;
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/a", "a"), "r"), CancellationToken.None));
        Assert.Equal(0, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        probe.At = StoreMoment.AfterCommit;
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/a", "a"), "r"), CancellationToken.None));
        probe.At = StoreMoment.BeforeStrike;
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Backlog.StrikeAsync([Line("1")], CancellationToken.None));
        probe.At = null;
        Assert.Equal(1, await records.Catalogue.Done(Add(Structure("structures/a", "a"), "r")));
        Assert.Equal([], await records.Keeping.Problems());
    }

    private static async Task Work(SqliteRecords records)
    {
        var a = Structure("structures/a", "a", "1");
        await records.Catalogue.CommitAsync(Add(a, "r1"), CancellationToken.None);
        await records.Catalogue.CommitAsync(Revise(Structure("structures/a", "a2"), a.Hash.Etag, "r2"), CancellationToken.None);
        await records.Catalogue.CommitAsync(Remove(PermitScreen.Catalogue.Storage.ResourceKind.Structure, "structures/a", Structure("x", "a2").Hash.Etag, "r3"), CancellationToken.None);
        await records.Imports.BeginAsync(Import("i1"), CancellationToken.None);
        await records.Imports.StageAsync("i1", Piece(0, [.. Enumerable.Range(0, 20).Select(i => Structure(Name(i), "x"))]), CancellationToken.None);
        await records.Imports.StageAsync("i1", Piece(1, Structure("structures/b", "b"), a), CancellationToken.None);
        await records.Imports.PublishAsync("i1", 2, By("pub"), CancellationToken.None);
    }
}
