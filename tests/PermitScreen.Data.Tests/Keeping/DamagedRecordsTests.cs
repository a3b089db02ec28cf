using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Keeping;

/// <summary>A backup is needed most where the records are damaged: the damage must not keep it from being restored.</summary>
public sealed class DamagedRecordsTests : IDisposable
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

    [Theory]
    [InlineData("UPDATE change_sets SET reason = 'another' WHERE version = 2", "has the hash")]
    [InlineData("UPDATE contents SET bytes = x'00' WHERE rowid = 2", "has the hash")]
    [InlineData("DELETE FROM audit WHERE sequence = 2", "has the hash")]
    [InlineData("UPDATE version SET \"check\" = x'00'", "cannot be read")]
    [InlineData("UPDATE version SET version = 1", "cannot be read")]
    [InlineData("UPDATE version SET version = 9223372036854775807", "cannot be read")]
    [InlineData("UPDATE version SET \"check\" = x'00'; DELETE FROM change_sets", "cannot be read")]
    [InlineData("DELETE FROM version", "cannot be read")]
    public async Task Damaged_records_are_replaced_while_the_service_goes_on(string sql, string words)
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Fill(records);
        Damage(sql);
        var result = await records.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None);
        await Restored(records, result, words);
    }

    [Fact]
    public async Task Records_with_damaged_pages_are_replaced()
    {
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            await Fill(records);
        }

        var path = _folder.File("catalogue.db");
        var bytes = await File.ReadAllBytesAsync(path);
        var (page, first) = (4096, bytes.Length / 4096 / 2);
        bytes.AsSpan(page * first, page * 3).Fill(0x5A);
        await File.WriteAllBytesAsync(path, bytes);
        Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path));
        await using var again = SqliteRecords.Open(new SqliteSettings { Folder = _folder.Path, CheckPagesUpToBytes = 0 }, Start);
        var result = await again.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None);
        await Restored(again, result, "has the hash");
    }

    [Fact]
    public async Task Records_of_which_no_version_can_be_read_are_left_as_they_are()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await Fill(records);
        Damage("DELETE FROM version; DELETE FROM change_sets");
        var error = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.RestoreAsync(Backup, Kept, By("res"), CancellationToken.None));
        Assert.Equal(StoreTrouble.Damaged, error.Trouble);
        Assert.False(File.Exists(Kept));
        Assert.NotEqual([], await records.Keeping.Problems());
    }

    [Fact]
    public async Task A_backup_put_in_the_place_of_records_that_cannot_be_opened_is_sound()
    {
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            await Fill(records);
        }

        var path = _folder.File("catalogue.db");
        await File.WriteAllTextAsync(path, string.Join('\n', Enumerable.Repeat("This is no database.", 500)));
        var error = Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path));
        Assert.Contains("move catalogue.db, catalogue.db-wal and catalogue.db-shm away and copy the backup to catalogue.db", error.Message, StringComparison.Ordinal);
        foreach (var name in new[] { path, path + "-wal", path + "-shm" })
        {
            File.Delete(name);
        }

        File.Copy(Backup, path);
        await using var again = SqliteStores.Open(_folder.Path);
        Assert.Equal([], await again.Keeping.Problems());
        Assert.Equal(2, (await again.Catalogue.All(2)).Count);
        Assert.Equal(3, await again.Catalogue.Done(Add(Structure("structures/after", "x"))));
    }

    private async Task Restored(SqliteRecords records, RestoreResult result, string words)
    {
        Assert.Equal((2, 4, 5), (result.Restored, result.Replaced, result.Now.Version));
        Assert.Equal([], await records.Keeping.Problems());
        Assert.Equal(2, (await records.Catalogue.All(5)).Count);
        var subject = (await records.Catalogue.ReadAuditAsync(null, 1, CancellationToken.None))[0].Subject;
        Assert.Contains("version 2, in place of version 4 ", subject, StringComparison.Ordinal);
        Assert.Contains(words, subject, StringComparison.Ordinal);
        Assert.EndsWith("the replaced records were damaged", subject, StringComparison.Ordinal);
        Assert.Equal(new[] { Backup, Kept }, Directory.GetFiles(_elsewhere.Path).Order(StringComparer.Ordinal));
        var kept = await Assert.ThrowsAsync<StoreException>(() => records.Keeping.CheckBackupAsync(Kept, CancellationToken.None));
        Assert.Equal(StoreTrouble.Damaged, kept.Trouble);
        Assert.Equal(6, await records.Catalogue.Done(Add(Structure("structures/after", "x"))));
    }

    /// <summary>Two versions in the backup, and two more in the records.</summary>
    private async Task Fill(SqliteRecords records)
    {
        for (var i = 0; i < 4; i++)
        {
            if (i == 2)
            {
                await records.Keeping.BackUpAsync(Backup, CancellationToken.None);
            }

            await records.Catalogue.Done(Add(Structure(Name(i), new string((char)('a' + i), 30_000))));
        }
    }

    private void Damage(string sql)
    {
        using var connection = new SqliteConnection($"Data Source={_folder.File("catalogue.db")};Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
        command.CommandText = "PRAGMA foreign_keys = OFF";
        command.ExecuteNonQuery();
        command.CommandText = sql;
        Assert.True(command.ExecuteNonQuery() > 0);
    }
}
