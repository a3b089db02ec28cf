using System.Globalization;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Data.Tests.Support;

namespace PermitScreen.Data.Tests.Damage;

/// <summary>A flipped bit anywhere in the file of the records is noticed, or changes no answer.</summary>
public sealed class FlippedBitTests : IAsyncLifetime, IDisposable
{
    private const int DefaultFlips = 2000;
    private const int Seed = 20260301;

    private readonly TestFolder _sound = new();
    private readonly TestFolder _flipped = new();
    private readonly Dictionary<string, string> _expected = new(StringComparer.Ordinal);
    private byte[] _bytes = [];

    public async Task InitializeAsync()
    {
        await SmallRecords.MakeAsync(_sound.Path);
        _bytes = await File.ReadAllBytesAsync(_sound.File("catalogue.db"));
        Assert.False(File.Exists(_sound.File("catalogue.db-wal")));
        File.Copy(_sound.File("lines.db"), _flipped.File("lines.db"));
        await using var records = SqliteStores.Open(_sound.Path);
        Assert.Equal([], await records.Keeping.Problems());
        foreach (var (question, ask) in SmallRecords.Questions)
        {
            _expected.Add(question, await ask(records));
        }
    }

    public Task DisposeAsync() => Task.CompletedTask;

    public void Dispose()
    {
        _sound.Dispose();
        _flipped.Dispose();
    }

    /// <summary>Without the check of all pages at the start, as with a large file: each answer has to prove itself.</summary>
    [Fact]
    public async Task No_answer_is_changed_by_a_flipped_bit()
    {
        var counts = await Flip(Chosen(), checkPages: false);
        Assert.True(counts.Keys.Select(k => k.Region).Distinct().Count() >= 10);
        Assert.Contains(counts.Keys, k => k.Outcome == "refused at opening");
        Assert.Contains(counts.Keys, k => k.Outcome == "noticed at reading");
        foreach (var ((region, outcome), count) in counts.OrderBy(c => c.Key.Region, StringComparer.Ordinal).ThenBy(c => c.Key.Outcome, StringComparer.Ordinal))
        {
            Figures.Note($"store.page_flips[{region}; {outcome}]", count);
        }

        Figures.Note("store.page_flips", counts.Values.Sum());
    }

    [Fact]
    public async Task A_small_file_is_checked_page_by_page_when_it_is_opened()
    {
        var counts = await Flip(Chosen().Take(250), checkPages: true);
        Assert.DoesNotContain(counts.Keys, k => k.Region.EndsWith("cell pointers", StringComparison.Ordinal) && k.Outcome == "noticed at reading");
        Assert.Contains(counts.Keys, k => k.Region.EndsWith("cell pointers", StringComparison.Ordinal) && k.Outcome == "refused at opening");
    }

    /// <summary>Bytes spread over every region of every page, in turn; each with one bit.</summary>
    private IEnumerable<(string Region, int At, int Bit)> Chosen()
    {
        var random = new Random(Seed);
        var regions = PageRegions.Of(_sound.File("catalogue.db"));
        var asked = Environment.GetEnvironmentVariable("PERMITSCREEN_FLIPS");
        if (asked == "all")
        {
            return [.. regions.SelectMany(r => Enumerable.Range(r.Start, r.Length).Select(at => (r.Region, at, random.Next(8))))];
        }

        var flips = string.IsNullOrEmpty(asked) ? DefaultFlips : int.Parse(asked, CultureInfo.InvariantCulture);

        // Regions of a kind get the same share, so that the many cells do not crowd out the few headers.
        var kinds = regions.GroupBy(r => r.Region).Select(g => g.ToArray()).ToArray();
        return [.. Enumerable.Range(0, flips).Select(i =>
        {
            var kind = kinds[i % kinds.Length];
            var region = kind[i / kinds.Length % kind.Length];
            return (region.Region, region.Start + random.Next(region.Length), random.Next(8));
        })];
    }

    private async Task<Dictionary<(string Region, string Outcome), int>> Flip(IEnumerable<(string Region, int At, int Bit)> flips, bool checkPages)
    {
        var counts = new Dictionary<(string Region, string Outcome), int>();
        foreach (var (region, at, bit) in flips)
        {
            var changed = (byte[])_bytes.Clone();
            changed[at] ^= (byte)(1 << bit);
            File.Delete(_flipped.File("catalogue.db-wal"));
            File.Delete(_flipped.File("catalogue.db-shm"));
            await File.WriteAllBytesAsync(_flipped.File("catalogue.db"), changed);
            var outcome = await Ask(FormattableString.Invariant($"byte {at} ({region}), bit {bit}"), checkPages);
            counts[(region, outcome)] = counts.GetValueOrDefault((region, outcome)) + 1;
        }

        return counts;
    }

    private async Task<string> Ask(string flip, bool checkPages)
    {
        SqliteRecords records;
        try
        {
            var settings = new SqliteSettings { Folder = _flipped.Path, CheckPagesUpToBytes = checkPages ? long.MaxValue : 0 };
            records = SqliteRecords.Open(settings, Samples.Start);
        }
        catch (StoreException error)
        {
            Assert.NotEqual(StoreTrouble.Device, error.Trouble);
            return "refused at opening";
        }

        await using (records)
        {
            var noticed = 0;
            foreach (var (question, ask) in SmallRecords.Questions)
            {
                try
                {
                    var answer = await ask(records);
                    Assert.True(answer == _expected[question], $"{flip}: {question} was answered {answer} and must be {_expected[question]}");
                }
                catch (StoreException error)
                {
                    Assert.True(error.Trouble is StoreTrouble.Damaged or StoreTrouble.Other, $"{flip}: {question}: {error.Trouble} {error.Message}");
                    noticed++;
                }
                catch (Exception error) when (error is not Xunit.Sdk.XunitException)
                {
                    Assert.Fail($"{flip}: {question}: {error}");
                }
            }

            return noticed > 0 ? "noticed at reading" : "changes no answer";
        }
    }
}
