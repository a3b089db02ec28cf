using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Keeping;

/// <summary>Backing up and restoring while the service goes on.</summary>
public sealed class BackupTests : IDisposable
{
    private readonly TestFolder _folder = new();
    private readonly TestFolder _elsewhere = new();

    private string Backup => _elsewhere.File("backup.db");

    private string Kept => _elsewhere.File("kept.db");

    public void Dispose()
    {
        _folder.Dispose();
        _elsewhere.Dispose();
    }

    [Fact]
    public async Task A_backup_is_one_file_of_one_instant_while_others_write()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Fill(records, 60);
        using var over = new CancellationTokenSource();
        var writer = Task.Run(async () =>
        {
            for (var i = 1000; !over.IsCancellationRequested; i++)
            {
                await records.Catalogue.Done(Add(Structure(Name(i), "x")));
            }
        });
        var before = await records.Catalogue.ReadVersionAsync(CancellationToken.None);
        var stamp = await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
        await over.CancelAsync();
        await writer;
        Assert.InRange(stamp.Version, before.Version, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        Assert.Equal([Backup], Directory.GetFiles(_elsewhere.Path));
        Assert.Equal(stamp, await records.Keeping.CheckBackupAsync(Backup, CancellationToken.None));
        Assert.Equal([Backup], Directory.GetFiles(_elsewhere.Path));
        Assert.Equal(stamp, await records.Catalogue.FindVersionAsync(stamp.Version, CancellationToken.None));
        var again = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.BackUpAsync(Backup, CancellationToken.None));
        Assert.Equal(StoreTrouble.NotAllowed, again.Trouble);
    }

    [Fact]
    public async Task A_backup_that_is_cancelled_leaves_nothing()
    {
        using var stop = new CancellationTokenSource();
        await using var records = SqliteStores.Open(_folder.Path, new CancellingProbe(stop));
        await Fill(records, 60);
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => records.Keeping.BackUpAsync(Backup, stop.Token));
        Assert.Empty(Directory.GetFiles(_elsewhere.Path));
        var none = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.BackUpAsync(_elsewhere.File("no/such/folder.db"), CancellationToken.None));
        Assert.Equal(StoreTrouble.NotAllowed, none.Trouble);
        Assert.Equal(61, await records.Catalogue.Done(Add(Structure("structures/z", "z"))));
    }

    [Fact]
    public async Task What_is_no_sound_backup_is_refused_and_changes_nothing()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Fill(records, 10);
        await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
        var bytes = await File.ReadAllBytesAsync(Backup);
        var damaged = (byte[])bytes.Clone();
        damaged[bytes.Length / 2] ^= 1;
        await Refused(damaged, StoreTrouble.Damaged);
        await Refused(bytes[..(bytes.Length / 2)], StoreTrouble.Damaged);
        await Refused([], StoreTrouble.Other);
        await Refused([.. Enumerable.Repeat((byte)'t', 9000)], StoreTrouble.Damaged);
        var newer = (byte[])bytes.Clone();
        newer[63] = 77; // user_version: https://sqlite.org/fileformat2.html, section 1.3
        await Refused(newer, StoreTrouble.NewerSchema);
        await Refused(null, StoreTrouble.NotAllowed);
        Assert.Equal(10, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        Assert.DoesNotContain(Directory.GetFiles(_folder.Path), f => f.Contains("restoring", StringComparison.Ordinal));

        async Task Refused(byte[]? content, StoreTrouble trouble)
        {
            var path = _elsewhere.File("bad.db");
            File.Delete(path);
            if (content is not null)
            {
                await File.WriteAllBytesAsync(path, content);
            }

            var error = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.CheckBackupAsync(path, CancellationToken.None));
            Assert.Equal(trouble, error.Trouble);
            Assert.Contains(path, error.Message, StringComparison.Ordinal);
            error = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.RestoreAsync(path, Kept, By("res"), CancellationToken.None));
            Assert.Equal(trouble, error.Trouble);
            Assert.False(File.Exists(Kept));
        }
    }

    [Fact]
    public async Task Restoring_replaces_everything_under_a_newer_version_and_keeps_what_was_replaced()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        var store = records.Catalogue;
        await Fill(records, 5);
        await store.Done(Add(Structure("structures/a", "old")));
        var backup = await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
        var held = await store.Text(6);
        await store.Done(Revise(Structure("structures/a", "new"), Structure("x", "old").Hash.Etag, "later"));
        await store.Done(Add(Structure("structures/b", "b")));
        var replaced = await store.ReadVersionAsync(CancellationToken.None);
        var replacedHash = (await store.ReadAuditAsync(null, 1, CancellationToken.None))[0].Hash;

        var result = await records.Keeping.RestoreAsync(Backup, Kept, By("res", 90, "wrong import"), CancellationToken.None);
        Assert.Equal((6, 8), (result.Restored, result.Replaced));
        Assert.Equal(9, result.Now.Version);
        Assert.Equal(backup.State, result.Now.State);
        Assert.NotEqual(replaced.Timeline, result.Now.Timeline);
        Assert.Equal(result.Now, await store.ReadVersionAsync(CancellationToken.None));
        Assert.Equal(held, await store.Text(9));
        Assert.Equal(held, await store.Text(6));
        Assert.Null(await store.FindVersionAsync(7, CancellationToken.None));
        Assert.Equal([9, 6, 5], (await store.ReadChangeSetsAsync(null, 3, CancellationToken.None)).Select(c => c.Version));
        Assert.Equal([6, 5], (await store.ReadChangeSetsAsync(8, 2, CancellationToken.None)).Select(c => c.Version));
        Assert.Empty((await store.ReadChangesAsync(6, CancellationToken.None)).Began);
        await Assert.ThrowsAsync<StoreException>(() => store.ReadChangesAsync(7, CancellationToken.None));
        var entry = (await store.ReadAuditAsync(null, 1, CancellationToken.None))[0];
        Assert.Equal(("restore backup", 9L, By("res", 90, "wrong import")), (entry.Action, entry.Version, entry.Provenance));
        Assert.Contains(replacedHash.ToString(), entry.Subject, StringComparison.Ordinal);
        Assert.Equal([], await records.Keeping.Problems());

        Assert.Equal(replaced, await records.Keeping.CheckBackupAsync(Kept, CancellationToken.None));
        Assert.Equal(10, await store.Done(Revise(Structure("structures/a", "new"), Structure("x", "old").Hash.Etag, "later")));
        var back = await records.Keeping.RestoreAsync(Kept, _elsewhere.File("kept2.db"), By("res"), CancellationToken.None);
        Assert.Equal((8, 10, 11), (back.Restored, back.Replaced, back.Now.Version));
        Assert.Equal([], await records.Keeping.Problems());
    }

    [Fact]
    public async Task A_process_that_ends_while_it_restores_leaves_the_old_records_or_the_restored_ones()
    {
        using var photographs = new TestFolder();
        var probe = new PhotographingProbe(_folder.Path, photographs.Path);
        string old;
        string restored;
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            await Fill(records, 120);
            await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
            await records.Catalogue.Done(Add(Structure("structures/z", new string('z', 500_000))));
            old = await records.Catalogue.Text(121);
            restored = await records.Catalogue.Text(120);
        }

        await using (var records = SqliteStores.Open(_folder.Path, probe))
        {
            await records.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None);
        }

        var moments = probe.Taken.Where(t => t.Moment is not StoreMoment.InBackup).ToList();
        Assert.True(moments.Count(t => t.Moment == StoreMoment.InRestore) >= 3);
        foreach (var (moment, _, folder) in moments)
        {
            await using var records = SqliteStores.Open(folder);
            var version = (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version;
            Assert.Equal(moment == StoreMoment.AfterRestore ? 122 : 121, version);
            Assert.Equal(moment == StoreMoment.AfterRestore ? restored : old, await records.Catalogue.Text(version));
            Assert.Equal([], await records.Keeping.Problems());
            Assert.False(File.Exists(Path.Combine(folder, "catalogue.restoring")));
            await records.Catalogue.Done(Add(Structure("structures/after", "x")));
        }
    }

    [Fact]
    public async Task An_error_in_the_middle_of_restoring_leaves_the_old_records()
    {
        var probe = new ThrowingProbe(null);
        await using var records = SqliteStores.Open(_folder.Path, probe);
        await Fill(records, 120);
        await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
        await records.Catalogue.Done(Add(Structure("structures/z", "z")));
        probe.At = StoreMoment.InRestore;
        await Assert.ThrowsAsync<InvalidOperationException>(() => records.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None));
        probe.At = null;
        Assert.Equal(121, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        Assert.Equal([], await records.Keeping.Problems());
        Assert.Equal(122, await records.Catalogue.Done(Add(Structure("structures/y", "y"))));
    }

    [Fact]
    public async Task Readers_that_are_in_the_middle_see_the_old_records_to_their_end()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Fill(records, 60);
        await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
        await records.Catalogue.Done(Add(Structure("structures/z", "z")));
        var read = 0;
        await foreach (var _ in records.Catalogue.ReadAsync(61, CancellationToken.None))
        {
            if (++read == 5)
            {
                await records.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None);
            }
        }

        Assert.Equal(61, read);
        Assert.Equal(60, (await records.Catalogue.All(62)).Count);
    }

    private static async Task Fill(SqliteRecords records, int count)
    {
        for (var i = 0; i < count; i++)
        {
            await records.Catalogue.Done(Add(Structure(Name(i), new string((char)('a' + (i % 26)), 30_000 + i))));
        }
    }

    private sealed class CancellingProbe(CancellationTokenSource stop) : IStoreProbe
    {
        public void Reached(StoreMoment moment, string what)
        {
            if (moment == StoreMoment.InBackup)
            {
                stop.Cancel();
            }
        }
    }
}
