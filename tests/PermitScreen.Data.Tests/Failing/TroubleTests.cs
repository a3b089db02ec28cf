using System.Runtime.Versioning;
using Microsoft.Data.Sqlite;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Failing;

/// <summary>Every trouble with the files is told in plain words, and nothing is lost.</summary>
public sealed class TroubleTests : IDisposable
{
    private readonly TestFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task A_second_process_is_told_to_use_the_server()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        var error = Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path));
        Told(error, StoreTrouble.Locked, _folder.Path, "--server");
    }

    [Fact]
    public async Task A_full_device_is_told_and_work_goes_on_once_there_is_room()
    {
        await using var records = SqliteRecords.Open(new SqliteSettings { Folder = _folder.Path, MostPages = 90 }, Start);
        var version = 0L;
        StoreException? error = null;
        for (var i = 0; error is null; i++)
        {
            try
            {
                version = await records.Catalogue.Done(Add(Structure(Name(i), new string('x', 3000 + i))));
            }
            catch (StoreException full)
            {
                error = full;
            }
        }

        Told(error, StoreTrouble.Full, _folder.File("catalogue.db"), "Make room");
        Assert.True(version > 3);
        Assert.Equal(version, (await records.Catalogue.ReadVersionAsync(CancellationToken.None)).Version);
        await records.Imports.BeginAsync(Import("i1"), CancellationToken.None);
        await Assert.ThrowsAsync<StoreException>(() => records.Imports.StageAsync("i1", Piece(0, Structure("structures/z", new string('z', 300_000))), CancellationToken.None));
        Assert.Equal(0, (await records.Imports.FindAsync("i1", CancellationToken.None))!.NextPiece);
        await records.File.Writer.AloneAsync(database => database.Whole("PRAGMA max_page_count = 100000"), CancellationToken.None);
        Assert.Equal(version + 1, await records.Catalogue.Done(Add(Structure("structures/z", new string('z', 300_000)))));
        Assert.Equal([], await records.Keeping.Problems());
    }

    [Fact]
    public async Task A_file_that_another_connection_holds_is_told_and_can_be_written_afterwards()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        await records.Catalogue.Done(Add(Structure("structures/a", "a")));
        using (var other = new SqliteConnection($"Data Source={_folder.File("catalogue.db")};Pooling=False"))
        {
            other.Open();
            using var command = other.CreateCommand();
            command.CommandText = "BEGIN EXCLUSIVE";
            command.ExecuteNonQuery();
            var error = await Assert.ThrowsAsync<StoreException>(() => records.Catalogue.CommitAsync(Add(Structure("structures/b", "b")), CancellationToken.None));
            Told(error, StoreTrouble.Locked, _folder.File("catalogue.db"), "Stop the other process");
            Assert.Equal("structures/a=a", await records.Catalogue.Text(1));
        }

        Assert.Equal(2, await records.Catalogue.Done(Add(Structure("structures/b", "b"))));
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.5)]
    [InlineData(0.9)]
    public async Task A_file_that_was_cut_off_is_refused_and_left_as_it_is(double share)
    {
        await Fill();
        var path = _folder.File("catalogue.db");
        var bytes = await File.ReadAllBytesAsync(path);
        var cut = bytes[..(int)(bytes.Length * share)];
        await File.WriteAllBytesAsync(path, cut);
        Told(Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path)), StoreTrouble.Damaged, path, "backup");
        Assert.Equal(cut, await File.ReadAllBytesAsync(path));
    }

    [Fact]
    public async Task Text_in_place_of_the_file_is_refused_and_left_as_it_is()
    {
        var text = string.Join('\n', Enumerable.Repeat("This is no database.", 500));
        await File.WriteAllTextAsync(_folder.File("catalogue.db"), text);
        Told(Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path)), StoreTrouble.Damaged, _folder.File("catalogue.db"), "no database");
        Assert.Equal(text, await File.ReadAllTextAsync(_folder.File("catalogue.db")));
    }

    [Theory]
    [InlineData("PRAGMA user_version = 99", StoreTrouble.NewerSchema, "newer version")]
    [InlineData("PRAGMA user_version = 0", StoreTrouble.Damaged, "header contradicts")]
    [InlineData("PRAGMA application_id = 7", StoreTrouble.Other, "another program")]
    [InlineData("DROP INDEX revisions_by_to", StoreTrouble.Damaged, "tables")]
    [InlineData("CREATE TRIGGER t AFTER INSERT ON audit BEGIN DELETE FROM audit; END", StoreTrouble.Damaged, "tables")]
    [InlineData("DELETE FROM version", StoreTrouble.Damaged, "missing")]
    [InlineData("UPDATE version SET version = 3", StoreTrouble.Damaged, "checksum")]
    public async Task A_file_with_another_schema_is_refused_and_left_as_it_is(string sql, StoreTrouble trouble, string words)
    {
        await Fill();
        var path = _folder.File("catalogue.db");
        using (var connection = new SqliteConnection($"Data Source={path};Pooling=False"))
        {
            connection.Open();
            using var command = connection.CreateCommand();
            command.CommandText = sql;
            command.ExecuteNonQuery();
            command.CommandText = "PRAGMA journal_mode = DELETE";
            if (trouble == StoreTrouble.NewerSchema)
            {
                command.ExecuteNonQuery();
            }
        }

        var bytes = await File.ReadAllBytesAsync(path);
        Told(Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path)), trouble, path, words);
        Assert.Equal(bytes, await File.ReadAllBytesAsync(path));
    }

    [Fact]
    public async Task A_database_of_another_program_is_refused_and_left_as_it_is()
    {
        using (var connection = new SqliteConnection($"Data Source={_folder.File("catalogue.db")};Pooling=False"))
        {
            connection.Open();
            using var command = connection.CreateCommand();
            command.CommandText = "CREATE TABLE t (a)";
            command.ExecuteNonQuery();
        }

        var bytes = await File.ReadAllBytesAsync(_folder.File("catalogue.db"));
        Told(Assert.Throws<StoreException>(() => SqliteStores.Open(_folder.Path)), StoreTrouble.Other, _folder.File("catalogue.db"), "another program");
        Assert.Equal(bytes, await File.ReadAllBytesAsync(_folder.File("catalogue.db")));
    }

    [Fact]
    public void A_folder_that_cannot_be_made_is_told()
    {
        File.WriteAllText(_folder.File("file"), "");
        var error = Assert.Throws<StoreException>(() => SqliteStores.Open(Path.Combine(_folder.File("file"), "records")));
        Assert.True(error.Trouble is StoreTrouble.NotAllowed or StoreTrouble.Device);
        Assert.Contains(_folder.File("file"), error.Message, StringComparison.Ordinal);
    }

    /// <summary>File rights do not bind a privileged account, but nobody makes folders among the kernel's own files.</summary>
    [Fact]
    [UnsupportedOSPlatform("windows")]
    public void A_folder_that_may_not_be_written_is_told()
    {
        var folder = "/sys/kernel/records";
        if (!Environment.IsPrivilegedProcess)
        {
            folder = Directory.CreateDirectory(_folder.File("records")).FullName;
            File.SetUnixFileMode(folder, UnixFileMode.UserRead | UnixFileMode.UserExecute);
        }

        Told(Assert.Throws<StoreException>(() => SqliteStores.Open(folder)), StoreTrouble.NotAllowed, folder, "right to read and write");
    }

    [Fact]
    public async Task Temporary_records_are_gone_afterwards()
    {
        var folder = _folder.File("temporary");
        await using (var records = SqliteRecords.Open(new SqliteSettings { Folder = folder, Temporary = true }, Start))
        {
            await records.Catalogue.Done(Add(Structure("structures/a", "a")));
            Assert.True(Directory.Exists(folder));
            Assert.Equal(Path.Combine(folder, "catalogue.segment"), records.SegmentPath);
        }

        Assert.False(Directory.Exists(folder));
    }

    private static void Told(StoreException? error, StoreTrouble trouble, params string[] words)
    {
        Assert.Equal(trouble, error!.Trouble);
        Assert.All(words, word => Assert.Contains(word, error.Message, StringComparison.Ordinal));
        Assert.Contains("othing was changed", error.Message, StringComparison.Ordinal);
    }

    private async Task Fill()
    {
        await using var records = SqliteStores.Open(_folder.Path);
        for (var i = 0; i < 20; i++)
        {
            await records.Catalogue.Done(Add(Structure(Name(i), new string('x', 3000 + i))));
        }
    }
}
