using PermitScreen.Contracts.V1;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Tests.Support;
using EffectResult = PermitScreen.Rating.Checks.EffectResult;
using EffectSense = PermitScreen.Rating.Structures.EffectSense;

namespace PermitScreen.Service.Tests.Properties;

/// <summary>Cases of single trips (one live-load factor for all weights), and their results effect by effect.</summary>
internal static class Rated
{
    public const string Alone = "alone";
    public const string Centreline = "alone-on-centreline";
    public const string Crawl = "alone-on-centreline-at-crawl";

    /// <summary>The hand-worked cases that ask for a single trip, and the demo's first application.</summary>
    public static TheoryData<string> SingleTrips() =>
        [.. Directory.EnumerateDirectories(Repository.Path("tests", "hand-worked"))
            .Select(d => Path.GetFileName(d))
            .Where(n => ContractFiles.HandWorked(n).Application.PermitKind == PermitKind.SpecialSingleTrip)
            .Order(StringComparer.Ordinal)
            .Append("demo")];

    public static InProcess Case(string name) => Case(name, static _ => { }, static _ => { });

    /// <summary>A case with its application and its structures changed.</summary>
    public static InProcess Case(string name, Action<Application> ofApplication, Action<Structure> ofStructure)
    {
        var demo = name == "demo";
        var (application, structures, policy) = demo ? ContractFiles.Demo("01-reactor-vessel-13-axles.json") : ContractFiles.HandWorked(name);
        if (demo)
        {
            var named = application.Route.CrossingList.Crossings.Select(c => c.Structure).ToHashSet(StringComparer.Ordinal);
            structures = [.. structures.Where(s => named.Contains(s.Name))];
        }

        ofApplication(application);
        foreach (var structure in structures)
        {
            ofStructure(structure);
        }

        return new InProcess(application, structures, policy, demo ? ContractFiles.DemoDay : ContractFiles.HandWorkedDay);
    }

    /// <summary>Every effect of every crossing on every rung that is named.</summary>
    public static Dictionary<Key, EffectResult> Effects(RouteResult result, params string[] rungs) =>
        result.Crossings
            .SelectMany((c, i) => (c.Ladder?.Rungs ?? []).Where(r => rungs.Length == 0 || rungs.Contains(r.Rung.RungId)).SelectMany(r => r.Effects.Select(e => (i, r, e))))
            .ToDictionary(x => new Key(x.i, x.r.Rung.RungId, x.e.Effect.UnitId, x.e.Effect.EffectId, x.e.Effect.PlaneId, x.e.Sense), x => x.e);

    /// <summary>Multiplies every axle load of the permit.</summary>
    public static Action<Application> Loads(double factor) => application =>
    {
        foreach (var axle in application.Configurations.SelectMany(c => c.Loading.AxleTrains).SelectMany(t => t.Axles))
        {
            axle.LoadKn *= factor;
        }
    };

    public static Action<Application> Direction(TravelDirection direction) => application =>
    {
        foreach (var crossing in application.Route.CrossingList.Crossings)
        {
            crossing.Direction = direction;
        }
    };

    /// <summary>Both results have the same effects with the same states, and rating factors that agree.</summary>
    public static void Agree(IReadOnlyDictionary<Key, EffectResult> one, IReadOnlyDictionary<Key, EffectResult> other, double tolerance, double factor = 1)
    {
        Assert.NotEmpty(one);
        Assert.Equal(one.Keys.ToHashSet(), other.Keys.ToHashSet());
        foreach (var (key, result) in one)
        {
            Assert.True(result.State == other[key].State, $"{key}: {result.State}, {other[key].State}");
            Close(key, result.RatingFactor * factor, other[key].RatingFactor, tolerance);
        }
    }

    public static void Close(Key key, double? one, double? other, double tolerance) =>
        Assert.True(
            one.HasValue == other.HasValue && (one is not { } a || Math.Abs(a - other!.Value) <= tolerance * Math.Abs(a)),
            FormattableString.Invariant($"{key}: {one}, {other}"));

    /// <summary>Names one effect of one crossing on one rung.</summary>
    internal readonly record struct Key(int Crossing, string Rung, string Unit, string Effect, string Plane, EffectSense Sense);
}
