using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;
using static PermitScreen.Data.Tests.Support.Samples;

namespace PermitScreen.Data.Tests.Failing;

/// <summary>The file of the lines is a cache: whatever happens to it, work goes on.</summary>
public sealed class LinesTests : IDisposable
{
    private readonly TestFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task Lines_are_kept_found_listed_replaced_and_deleted()
    {
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            Assert.True(records.LinesWereLost);
            Assert.Equal((0, null), (records.Lines.Count(), records.Lines.Find(Line("1"))));
            records.Lines.Keep([(Line("1"), [1]), (Line("2"), [2, 2]), (Line("3"), [])]);
            records.Lines.Keep([(Line("2"), Blob(2, 20_000))]);
        }

        await using var again = SqliteStores.Open(_folder.Path);
        Assert.False(again.LinesWereLost);
        Assert.Equal([1], again.Lines.Find(Line("1"))!);
        Assert.Equal(Blob(2, 20_000), again.Lines.Find(Line("2"))!);
        Assert.Equal([], again.Lines.Find(Line("3"))!);
        Assert.Equal(new[] { "1", "3" }.Select(Line).ToHashSet(), again.Lines.Known([Line("1"), Line("3"), Line("4")]));
        var keys = new[] { "1", "2", "3" }.Select(Line).ToList();
        keys.Sort(Digest.Compare);
        Assert.Equal(keys, again.Lines.AllKeys());
        again.Lines.Delete([Line("1"), Line("4")]);
        Assert.Equal((2, null), (again.Lines.Count(), again.Lines.Find(Line("1"))));
    }

    [Theory]
    [InlineData("text")]
    [InlineData("cut")]
    [InlineData("newer")]
    [InlineData("foreign")]
    public async Task A_file_that_cannot_be_used_is_set_aside(string how)
    {
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            records.Lines.Keep([(Line("1"), Blob(1, 50_000))]);
        }

        var path = _folder.File("lines.db");
        var bytes = await File.ReadAllBytesAsync(path);
        await File.WriteAllBytesAsync(path, how switch
        {
            "text" => [.. Enumerable.Repeat((byte)'x', 5000)],
            "cut" => bytes[..3000],
            "newer" => With(bytes, 63, 9), // user_version: https://sqlite.org/fileformat2.html, section 1.3
            _ => With(bytes, 68, 9), // application_id
        });
        await using var again = SqliteStores.Open(_folder.Path);
        Assert.True(again.LinesWereLost);
        Assert.True(File.Exists(path + ".damaged"));
        Assert.Null(again.Lines.Find(Line("1"))!);
        again.Lines.Keep([(Line("1"), [1])]);
        Assert.Equal([1], again.Lines.Find(Line("1"))!);
    }

    /// <summary>Damage that is met later: what cannot be read is not there, and the next write makes the file anew where it must.</summary>
    [Fact]
    public async Task Damaged_pages_never_stop_the_work()
    {
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            records.Lines.Keep([.. Enumerable.Range(0, 200).Select(i => (Line(Name(i)), Blob(i, 3000)))]);
        }

        var path = _folder.File("lines.db");
        var sound = await File.ReadAllBytesAsync(path);
        var random = new Random(3);
        var (missing, replaced) = (0, 0);
        for (var round = 0; round < 40; round++)
        {
            var bytes = (byte[])sound.Clone();
            random.NextBytes(bytes.AsSpan(4096 * random.Next(1, bytes.Length / 4096), 64));
            File.Delete(path + "-wal");
            await File.WriteAllBytesAsync(path, bytes);
            await using var records = SqliteStores.Open(_folder.Path);
            var lost = records.LinesWereLost;
            missing += Enumerable.Range(0, 200).Count(i => records.Lines.Find(Line(Name(i))) is null);
            records.Lines.AllKeys();
            records.Lines.Known([Line(Name(1))]);
            records.Lines.Keep([.. Enumerable.Range(0, 200).Select(i => (Line(Name(i)), Blob(i, 3000)))]);
            Assert.All(Enumerable.Range(0, 200), i => Assert.Equal(Blob(i, 3000), records.Lines.Find(Line(Name(i)))!));
            replaced += records.LinesWereLost && !lost ? 1 : 0;
        }

        Assert.True(missing > 0);
        Assert.True(replaced > 0);
    }

    [Fact]
    public async Task The_identity_goes_with_the_file()
    {
        string id;
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            id = records.LinesId;
            Assert.NotEmpty(id);
            records.Lines.Keep([(Line("1"), [1])]);
            Assert.Equal(id, records.LinesId);
        }

        await using (var records = SqliteStores.Open(_folder.Path))
        {
            Assert.Equal(id, records.LinesId);
        }

        File.Delete(_folder.File("lines.db"));
        await using var again = SqliteStores.Open(_folder.Path);
        Assert.NotEmpty(again.LinesId);
        Assert.NotEqual(id, again.LinesId);
    }

    /// <summary>A damaged file that cannot be set aside: there are no lines until it can.</summary>
    [Fact]
    public async Task A_replacement_that_fails_is_tried_again_at_the_next_write()
    {
        string id;
        await using (var records = SqliteStores.Open(_folder.Path))
        {
            id = records.LinesId;
            records.Lines.Keep([.. Enumerable.Range(0, 200).Select(i => (Line(Name(i)), Blob(i, 3000)))]);
        }

        // Pages 2 and 3 are the roots of the table and of its index: https://sqlite.org/fileformat2.html, section 1.6
        var path = _folder.File("lines.db");
        var bytes = await File.ReadAllBytesAsync(path);
        bytes.AsSpan(4096, 8192).Fill(0x5A);
        await File.WriteAllBytesAsync(path, bytes);
        Directory.CreateDirectory(path + ".damaged");

        await using var again = SqliteStores.Open(_folder.Path);
        Assert.Equal(id, again.LinesId);
        for (var i = 0; i < 2; i++)
        {
            Assert.Throws<StoreException>(() => again.Lines.Keep([(Line("1"), [1])]));
            Assert.Equal((null, 0L, ""), (again.Lines.Find(Line("1")), again.Lines.Count(), again.LinesId));
            Assert.Empty(again.Lines.AllKeys());
            Assert.Empty(again.Lines.Known([Line("1")]));
        }

        Directory.Delete(path + ".damaged");
        again.Lines.Keep([(Line("1"), [1])]);
        Assert.Equal([1], again.Lines.Find(Line("1"))!);
        Assert.True(again.LinesWereLost);
        Assert.True(again.LinesId is not "" && again.LinesId != id);
    }

    [Fact]
    public async Task Keeping_is_all_or_nothing()
    {
        var probe = new ThrowingProbe(StoreMoment.LinesInsideTransaction);
        await using var records = SqliteStores.Open(_folder.Path, probe);
        Assert.Throws<InvalidOperationException>(() => records.Lines.Keep([(Line("1"), [1]), (Line("2"), [2])]));
        Assert.Equal(0, records.Lines.Count());
        probe.At = StoreMoment.LinesAfterCommit;
        Assert.Throws<InvalidOperationException>(() => records.Lines.Keep([(Line("1"), [1]), (Line("2"), [2])]));
        Assert.Equal(2, records.Lines.Count());
    }

    private static byte[] With(byte[] bytes, int at, byte value)
    {
        var changed = (byte[])bytes.Clone();
        changed[at] = value;
        return changed;
    }

    private static byte[] Blob(int seed, int length)
    {
        var bytes = new byte[length];
        new Random(seed).NextBytes(bytes);
        return bytes;
    }
}
