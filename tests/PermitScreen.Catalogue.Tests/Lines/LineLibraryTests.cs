using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Tests.Support;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Tests.Lines;

public sealed class LineLibraryTests
{
    private readonly Random _random = new(20260821);
    private readonly FakeLineStore _store = new();
    private readonly FaultList _faults = new();

    [Fact]
    public void Kept_lines_are_read_and_not_computed()
    {
        var model = Shuffled.Random(_random);
        Keep(model);
        var library = new LineLibrary(_store);
        var read = library.GetOrSolve(model, _faults)!;
        Assert.NotNull(library.GetOrSolve(Shuffled.Of(model, _random).Model, _faults));
        LineBits.AssertSame(new LineLibrary().GetOrSolve(model, _faults)!, read);
        Assert.Equal((0, 1, 0), (library.Counts.Solved, library.Counts.Read, library.Counts.Damaged));
        Assert.Equal(1, _store.Finds);
    }

    [Fact]
    public void Lines_that_are_not_kept_are_computed_once()
    {
        var model = Shuffled.Random(_random);
        var library = new LineLibrary(_store);
        Assert.NotNull(library.GetOrSolve(model, _faults));
        Assert.NotNull(library.GetOrSolve(model, _faults));
        Assert.Equal(1, library.Counts.Solved);
        Assert.Empty(_store.Blobs);
    }

    [Fact]
    public void A_damaged_blob_is_counted_never_used_and_replaced()
    {
        var model = Shuffled.Random(_random);
        var sound = Keep(model);
        var key = TrussKey.Of(model);
        var expected = new LineLibrary().GetOrSolve(model, _faults)!;
        const int Flips = 300;
        for (var i = 0; i < Flips; i++)
        {
            var bit = _random.Next(sound.Length * 8);
            var damaged = (byte[])sound.Clone();
            damaged[bit / 8] ^= (byte)(1 << (bit % 8));
            _store.Blobs[key] = damaged;
            var library = new LineLibrary(_store);
            LineBits.AssertSame(expected, library.GetOrSolve(model, _faults)!);
            Assert.Equal((1, 0, 1), (library.Counts.Solved, library.Counts.Read, library.Counts.Damaged));
            Assert.Equal(sound, _store.Blobs[key]);
        }

        Figures.Note("lines.blob_flips[computed anew and replaced]", Flips);
    }

    [Fact]
    public void The_blob_of_another_truss_is_not_used()
    {
        var (model, other) = (Shuffled.Random(_random), Shuffled.Random(_random));
        _store.Blobs[TrussKey.Of(model)] = Keep(other);
        var library = new LineLibrary(_store);
        LineBits.AssertSame(new LineLibrary().GetOrSolve(model, _faults)!, library.GetOrSolve(model, _faults)!);
        Assert.Equal(1, library.Counts.Damaged);
    }

    [Fact]
    public void A_store_that_fails_costs_a_computation_and_nothing_else()
    {
        var model = Shuffled.Random(_random);
        Keep(model);
        _store.Fails = true;
        var library = new LineLibrary(_store, mostMemoryBytes: 0);
        Assert.NotNull(library.GetOrSolve(model, _faults));
        Assert.Equal((1, 1), (library.Counts.Solved, library.Counts.StoreFailures));
        _store.Fails = false;
        Assert.NotNull(library.GetOrSolve(model, _faults));
        Assert.Equal((1, 1, 1), (library.Counts.Solved, library.Counts.StoreFailures, library.Counts.Read));
    }

    [Fact]
    public void Ensure_hands_out_what_is_to_be_kept_and_nothing_where_it_is_kept_and_sound()
    {
        var model = Shuffled.Random(_random);
        var library = new LineLibrary(_store);
        Assert.True(library.Ensure(model, _faults, out var toKeep));
        Assert.Equal(TrussKey.Of(model), toKeep!.Value.Key);
        _store.Keep([toKeep.Value]);
        Assert.True(library.Ensure(Shuffled.Of(model, _random).Model, _faults, out var nothing));
        Assert.Null(nothing);
        _store.Blobs[toKeep.Value.Key] = [.. toKeep.Value.Blob.Reverse()];
        Assert.True(library.Ensure(model, _faults, out var again));
        Assert.Equal(toKeep.Value.Blob, again!.Value.Blob);
        Assert.Equal((1, 1, 1), (library.Counts.Solved, library.Counts.Read, library.Counts.Damaged));
    }

    [Fact]
    public void Many_at_once_compute_once()
    {
        var models = Enumerable.Range(0, 20).Select(_ => Shuffled.Random(_random)).ToList();
        var ways = models.SelectMany(m => Enumerable.Range(0, 8).Select(_ => Shuffled.Of(m, _random).Model)).ToArray();
        _random.Shuffle(ways);
        var library = new LineLibrary(_store);
        Parallel.ForEach(ways, new ParallelOptions { MaxDegreeOfParallelism = 8 }, m => Assert.NotNull(library.GetOrSolve(m, new FaultList())));
        Assert.Equal(models.Select(TrussKey.Of).Distinct().Count(), library.Counts.Solved);
    }

    [Fact]
    public void Memory_stays_within_its_bound_and_what_is_used_stays()
    {
        const long Bound = 1 << 20;
        var library = new LineLibrary(store: null, Bound);
        var favourite = Shuffled.Random(_random);
        Assert.NotNull(library.GetOrSolve(favourite, _faults));
        var others = 0;
        for (; others < 200; others++)
        {
            Assert.NotNull(library.GetOrSolve(Shuffled.Random(_random), _faults));
            Assert.NotNull(library.GetOrSolve(favourite, _faults));
            Assert.InRange(library.Counts.MemoryBytes, 1, Bound);
        }

        Assert.Equal(others + 1, library.Counts.Solved);
        Assert.True(library.Counts.MemoryBytes > Bound / 4, "The test must fill the memory.");
    }

    [Fact]
    public void A_mechanism_is_refused_in_its_own_names_and_keeps_nothing()
    {
        // The panel has no diagonal: its upper joints sway.
        var model = new TrussSketch()
            .Joint("right foot", 6, 0).Joint("left foot", 0, 0).Joint("left head", 0, 4).Joint("right head", 6, 4)
            .Bar("left foot", "left head").Bar("left head", "right head").Bar("right head", "right foot").Bar("left foot", "right foot")
            .Pin("left foot").Roller("right foot").Deck("left foot", "right foot").Model();
        var library = new LineLibrary(_store);
        Assert.Null(library.GetOrSolve(model, _faults.Under("truss")));
        var fault = Assert.Single(_faults.All);
        Assert.Equal("truss", fault.Path);
        Assert.Contains("head", fault.Message, StringComparison.Ordinal);
        var ensured = new FaultList();
        Assert.False(library.Ensure(model, ensured, out var toKeep));
        Assert.Null(toKeep);
        Assert.Single(ensured.All);
        Assert.Null(library.Compute(model, ensured));
        Assert.Equal(2, ensured.Count);
        Assert.Empty(_store.Blobs);
    }

    private byte[] Keep(TrussModel model)
    {
        var (key, blob) = new LineLibrary().Compute(model, _faults)!.Value;
        _store.Blobs[key] = blob;
        return (byte[])blob.Clone();
    }
}
