using System.Globalization;
using System.Text;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Catalogue.Tests.Support;

namespace PermitScreen.Catalogue.Tests.Snapshots;

public sealed class SegmentFileTests : IDisposable
{
    private const int Revisions = 900;
    private const int HeaderBytes = 116;
    private const int LeadBytes = sizeof(int) + Digest.Length;
    private const int EndBytes = sizeof(int) + sizeof(long) + Digest.Length;

    private readonly string _folder = Directory.CreateTempSubdirectory("permitscreen-segment-").FullName;
    private readonly MemoryStore _store = new();
    private readonly List<string> _told = [];
    private readonly CancellationTokenSource _end = new(TimeSpan.FromSeconds(300));

    private string FilePath => Path.Combine(_folder, "segment");

    public void Dispose()
    {
        Directory.Delete(_folder, recursive: true);
        _end.Dispose();
    }

    [Fact]
    public async Task What_is_read_is_what_was_written()
    {
        var snapshot = await WriteAsync();
        Assert.False(File.Exists(FilePath + ".tmp"));
        var content = SegmentFile.TryRead(FilePath, progress: null, out var refusal, _end.Token);
        Assert.Null(refusal);
        Assert.Equal(snapshot.Stamp, content!.Stamp);
        var expected = snapshot.StructuresAfter().Select(s => s.Revision).Concat(snapshot.Policies.Values.Select(p => p.Revision)).ToList();
        Assert.Equal(expected.Select(r => r.Head), content.Revisions.Select(r => r.Head));
        Assert.Equal(expected.Select(r => Encoding.UTF8.GetString(r.Content.Span)), content.Revisions.Select(r => Encoding.UTF8.GetString(r.Content.Span)));
    }

    [Fact]
    public async Task Every_flipped_bit_of_a_small_file_is_noticed()
    {
        _store.Commit([.. Enumerable.Range(0, 8).Select(i => (Contents.Structure(i), (string?)"content")), ("policies/p@1", "p")]);
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        SegmentFile.Write(FilePath, await catalogue.CurrentAsync(null, _end.Token), _end.Token);
        var bytes = await File.ReadAllBytesAsync(FilePath);
        AssertNoticed(bytes, "all bits of a small file", Enumerable.Range(0, bytes.Length * 8).Select(b => (long)b));
    }

    /// <summary>Every bit of header, block leads and end; of what the blocks hold a sample of PERMITSCREEN_SEGMENT_FLIPS bits each (60).</summary>
    [Fact]
    public async Task A_flipped_bit_in_any_region_is_noticed()
    {
        await WriteAsync();
        var bytes = await File.ReadAllBytesAsync(FilePath);
        var regions = Regions(bytes);
        Assert.True(regions.Count(r => r.Name == "block content") > 2, "The file must have several blocks.");
        var sample = int.Parse(Environment.GetEnvironmentVariable("PERMITSCREEN_SEGMENT_FLIPS") ?? "60", CultureInfo.InvariantCulture);
        var random = new Random(20260901);
        foreach (var region in regions.GroupBy(r => r.Name))
        {
            AssertNoticed(bytes, region.Key, region.SelectMany(r => region.Key == "block content"
                ? Enumerable.Range(0, sample).Select(_ => (r.Start * 8L) + random.NextInt64(r.Length * 8L))
                : Enumerable.Range(0, r.Length * 8).Select(b => (r.Start * 8L) + b)));
        }
    }

    [Fact]
    public async Task A_file_cut_short_or_gone_on_with_is_refused()
    {
        await WriteAsync();
        var bytes = await File.ReadAllBytesAsync(FilePath);
        var random = new Random(20260902);
        var cuts = 0;
        foreach (var length in Enumerable.Range(0, HeaderBytes + LeadBytes + 2)
            .Concat(Enumerable.Range(bytes.Length - EndBytes - 2, EndBytes + 2))
            .Concat(Enumerable.Range(0, 100).Select(_ => random.Next(bytes.Length))))
        {
            await File.WriteAllBytesAsync(FilePath, bytes[..length]);
            Assert.Null(SegmentFile.TryRead(FilePath, progress: null, out var refusal, _end.Token));
            Assert.NotNull(refusal);
            cuts++;
        }

        await File.WriteAllBytesAsync(FilePath, [.. bytes, 0]);
        Assert.Null(SegmentFile.TryRead(FilePath, progress: null, out _, _end.Token));
        Figures.Note("segment.cuts", cuts);
    }

    [Fact]
    public async Task Blocks_that_change_places_are_noticed()
    {
        await WriteAsync();
        var bytes = await File.ReadAllBytesAsync(FilePath);
        var blocks = Regions(bytes).Where(r => r.Name == "block content").ToArray();
        var (first, second) = (Whole(blocks[0]), Whole(blocks[1]));
        await File.WriteAllBytesAsync(
            FilePath, [.. bytes[..HeaderBytes], .. second, .. first, .. bytes[(HeaderBytes + first.Length + second.Length)..]]);
        Assert.Null(SegmentFile.TryRead(FilePath, progress: null, out var refusal, _end.Token));
        Assert.Contains("block 0", refusal, StringComparison.Ordinal);

        byte[] Whole((string Name, int Start, int Length) block) => bytes[(block.Start - LeadBytes)..(block.Start + block.Length)];
    }

    [Fact]
    public void No_file_is_no_refusal()
    {
        Assert.Null(SegmentFile.TryRead(FilePath, progress: null, out var refusal, _end.Token));
        Assert.Null(refusal);
    }

    [Fact]
    public async Task A_start_takes_the_file_and_reads_only_what_changed_since()
    {
        await WriteAsync();
        var read = _store.WholeReads;
        _store.Commit(("structures/new", "new"), (Contents.Structure(3), null), (Contents.Structure(4), "revised"));
        Contents.AssertTrue(await LoadedAsync(), _store);
        Assert.Equal(read, _store.WholeReads);
        Assert.Empty(_told);
        Assert.Equal(_store.Newest, SegmentFile.TryRead(FilePath, progress: null, out _, _end.Token)!.Stamp.Version);
    }

    [Fact]
    public async Task A_damaged_file_is_told_not_used_and_written_anew()
    {
        await WriteAsync();
        var bytes = await File.ReadAllBytesAsync(FilePath);
        var damaged = (byte[])bytes.Clone();
        damaged[bytes.Length / 2] ^= 1;
        await File.WriteAllBytesAsync(FilePath, damaged);
        var read = _store.WholeReads;
        Contents.AssertTrue(await LoadedAsync(), _store);
        Assert.Equal(read + 1, _store.WholeReads);
        Assert.Contains("damaged", Assert.Single(_told), StringComparison.Ordinal);
        Assert.Equal(bytes, await File.ReadAllBytesAsync(FilePath));
    }

    [Fact]
    public async Task The_copy_of_other_records_is_not_used()
    {
        await WriteAsync();
        _store.Restore(("structures/A", "a"));
        Contents.AssertTrue(await LoadedAsync(), _store);
        Assert.Contains("no copy of these records", Assert.Single(_told), StringComparison.Ordinal);
    }

    [Fact]
    public async Task A_file_that_cannot_be_written_costs_nothing_but_a_message()
    {
        _store.Commit(("structures/A", "a"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), Path.Combine(_folder, "missing", "segment"), Tell);
        await catalogue.LoadAsync(progress: null, _end.Token);
        Assert.Equal(1, (await catalogue.CurrentAsync(null, _end.Token)).Version);
        await catalogue.StopAsync(_end.Token);
        Assert.All(_told, t => Assert.Contains("cannot be written", t, StringComparison.Ordinal));
        Assert.NotEmpty(_told);
    }

    private static List<(string Name, int Start, int Length)> Regions(byte[] bytes)
    {
        List<(string Name, int Start, int Length)> regions = [("header", 0, HeaderBytes)];
        for (var at = HeaderBytes; ;)
        {
            var length = BitConverter.ToInt32(bytes, at);
            if (length == 0)
            {
                Assert.Equal(bytes.Length, at + EndBytes);
                regions.Add(("end", at, EndBytes));
                return regions;
            }

            regions.Add(("block length and checksum", at, LeadBytes));
            regions.Add(("block content", at + LeadBytes, length));
            at += LeadBytes + length;
        }
    }

    private void AssertNoticed(byte[] bytes, string what, IEnumerable<long> bits)
    {
        var flips = 0;
        using var file = new FileStream(FilePath, FileMode.Open, FileAccess.ReadWrite, FileShare.ReadWrite, bufferSize: 0);
        foreach (var bit in bits)
        {
            var (at, mask) = (bit / 8, (byte)(1 << (int)(bit % 8)));
            Put(file, at, (byte)(bytes[at] ^ mask));
            Assert.True(SegmentFile.TryRead(FilePath, progress: null, out var refusal, _end.Token) is null, $"Bit {bit} ({what}) went unnoticed.");
            Assert.NotNull(refusal);
            Put(file, at, bytes[at]);
            flips++;
        }

        Assert.NotNull(SegmentFile.TryRead(FilePath, progress: null, out _, _end.Token));
        Figures.Note($"segment.flips[{what}]", flips);
    }

    private static void Put(FileStream file, long at, byte value)
    {
        file.Position = at;
        file.WriteByte(value);
        file.Flush();
    }

    private async Task<CatalogueSnapshot> WriteAsync()
    {
        var random = new Random(20260903);
        _store.Commit([.. Enumerable.Range(0, Revisions).Select(i => (Contents.Structure(i), (string?)Text(i)))]);
        _store.Commit((Contents.Structure(Revisions), "größer als 1 MB: " + new string('x', 1_200_000)), ("policies/p@1", "p"), ("policies/q@2026", "q"));
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), segmentPath: null);
        var snapshot = await catalogue.CurrentAsync(null, _end.Token);
        SegmentFile.Write(FilePath, snapshot, _end.Token);
        return snapshot;

        string Text(int i) => string.Create(CultureInfo.InvariantCulture, $"{i} {new string('a', random.Next(2_500))}");
    }

    private async Task<CatalogueSnapshot> LoadedAsync()
    {
        await using var catalogue = new CurrentCatalogue(_store, new PlainReader(), FilePath, Tell);
        await catalogue.LoadAsync(progress: null, _end.Token);
        var snapshot = await catalogue.CurrentAsync(null, _end.Token);
        await catalogue.StopAsync(_end.Token);
        return snapshot;
    }

    private void Tell(string message)
    {
        lock (_told)
        {
            _told.Add(message);
        }
    }
}
