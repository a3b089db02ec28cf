using PermitScreen.Contracts.V1;
using PermitScreen.Service.Tests.Deletion;
using RatingFactorState = PermitScreen.Rating.Checks.RatingFactorState;

namespace PermitScreen.Service.Tests.Properties;

/// <summary>What follows from the definition of RF and k alone (engineering rule B6), whatever the bridge.</summary>
public sealed class LoadTests
{
    private const double Tolerance = 1e-9;

    public static TheoryData<string> SingleTrips() => Rated.SingleTrips();

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void A_common_factor_on_all_axles_divides_RF_where_nobody_else_is_there(string name)
    {
        string[] rungs = [Rated.Alone, Rated.Centreline, Rated.Crawl];
        var before = Rated.Effects(Rated.Case(name).Screen(), rungs);
        foreach (var factor in new[] { 0.4, 1.7, 3.0 })
        {
            var after = Rated.Effects(Rated.Case(name, Rated.Loads(factor), static _ => { }).Screen(), rungs);
            Rated.Agree(before, after, Tolerance, 1 / factor);
        }
    }

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void Axles_times_k_bring_RF_to_1_on_every_rung(string name)
    {
        // The effect that governs on each rung of each crossing; with one state of travel, since each state has a k of its own.
        var before = Rated.Case(name);
        if (before.Application.Configurations.Count > 1)
        {
            return;
        }

        var checks = 0;
        var governing = Rated.Effects(before.Screen())
            .Where(e => e.Value.LargestAxleFactor > 0 && e.Value.State == RatingFactorState.Number)
            .GroupBy(e => (e.Key.Crossing, e.Key.Rung))
            .Select(g => g.MinBy(e => e.Value.RatingFactor));
        foreach (var (key, result) in governing)
        {
            var after = Rated.Effects(Rated.Case(name, Rated.Loads(result.LargestAxleFactor!.Value), static _ => { }).Screen(), key.Rung);
            Rated.Close(key, 1, after[key].RatingFactor, Tolerance);
            checks++;
        }

        Assert.True(checks > 0 || name.StartsWith("08", StringComparison.Ordinal) || name.StartsWith("21", StringComparison.Ordinal));
    }

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void A_second_state_of_travel_never_improves(string name)
    {
        var before = Rated.Case(name).Screen();
        foreach (var factor in new[] { 0.3, 1.0, 1.5 })
        {
            var after = Rated.Case(name, a => AddState(a, factor), static _ => { }).Screen();
            Assert.Null(Betterment.Of(before, after));
        }
    }

    /// <summary>The first state back to front, lighter or heavier.</summary>
    private static void AddState(Application application, double factor)
    {
        var second = application.Configurations[0].Clone();
        second.ConfigurationId = "second";
        var train = second.Loading.AxleTrains[0];
        var backwards = train.Axles.Reverse().Select(a => a.Clone()).ToList();
        for (var i = 0; i < backwards.Count; i++)
        {
            backwards[i].LoadKn *= factor;
            backwards[i].OffsetM = train.Axles[^1].OffsetM - train.Axles[train.Axles.Count - 1 - i].OffsetM;
        }

        train.Axles.Clear();
        train.Axles.AddRange(backwards);
        application.Configurations.Add(second);
    }
}
