using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Properties;

/// <summary>What follows from statics and from the rungs being each other's restrictions (engineering rules B1, C1).</summary>
public sealed class PlaceTests
{
    private const double Rounding = 1e-12;

    public static TheoryData<string> SingleTrips() => Rated.SingleTrips();

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void A_bridge_seen_in_a_mirror_has_the_same_rating_factors(string name) =>
        Rated.Agree(Rated.Effects(Rated.Case(name).Screen()), Rated.Effects(Rated.Case(name, Mirror, Mirror).Screen()), Rounding);

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void Both_directions_are_the_worse_of_forward_and_reverse(string name)
    {
        var both = Effects(name, TravelDirection.Both);
        var forward = Effects(name, TravelDirection.Forward);
        var reverse = Effects(name, TravelDirection.Reverse);
        Assert.NotEmpty(both);
        foreach (var (key, result) in both)
        {
            Rated.Close(key, result.RatingFactor, Least(forward.GetValueOrDefault(key)?.RatingFactor, reverse.GetValueOrDefault(key)?.RatingFactor), Rounding);
        }
    }

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void A_direction_that_is_not_said_counts_as_both(string name) =>
        Rated.Agree(Effects(name, TravelDirection.Both), Effects(name, TravelDirection.Unspecified), 0);

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void Each_restriction_helps_or_changes_nothing(string name)
    {
        var all = Rated.Effects(Rated.Case(name).Screen());
        foreach (var (less, more) in new[] { (Rated.Alone, Rated.Centreline), (Rated.Centreline, Rated.Crawl) })
        {
            foreach (var (key, restricted) in all.Where(e => e.Key.Rung == more))
            {
                var free = all[key with { Rung = less }];
                Assert.True(
                    Worth(restricted) >= Worth(free) * (1 - Rounding),
                    FormattableString.Invariant($"{key}: {less} {free.RatingFactor}, {more} {restricted.RatingFactor}"));
            }
        }
    }

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void Nobody_else_on_the_structure_helps_or_changes_nothing(string name)
    {
        // The row with traffic has the larger factor, and the vehicle alone is one of its arrangements.
        var all = Rated.Effects(Rated.Case(name).Screen());
        foreach (var (key, mixed) in all.Where(e => e.Key.Rung == "with-traffic"))
        {
            Assert.True(Worth(all[key with { Rung = Rated.Alone }]) >= Worth(mixed) * (1 - Rounding), $"{key}");
        }
    }

    private static Dictionary<Rated.Key, Rating.Checks.EffectResult> Effects(string name, TravelDirection direction) =>
        Rated.Effects(Rated.Case(name, Rated.Direction(direction), static _ => { }).Screen());

    private static double? Least(double? one, double? other) => one is null ? other : other is null ? one : Math.Min(one.Value, other.Value);

    private static double Worth(Rating.Checks.EffectResult result) => result.State switch
    {
        Rating.Checks.RatingFactorState.DeadLoadExceeds => double.NegativeInfinity,
        Rating.Checks.RatingFactorState.Number => result.RatingFactor!.Value,
        _ => double.PositiveInfinity,
    };

    private static void Mirror(Application application)
    {
        foreach (var axle in application.Configurations.SelectMany(c => c.Loading.AxleTrains).SelectMany(t => t.Axles).Where(a => a.HasLateralOffsetM))
        {
            axle.LateralOffsetM = -axle.LateralOffsetM;
        }
    }

    private static void Mirror(Structure structure)
    {
        (structure.Roadway.LeftKerbM, structure.Roadway.RightKerbM) = (-structure.Roadway.RightKerbM, -structure.Roadway.LeftKerbM);
        foreach (var plane in structure.Units.SelectMany(u => u.Truss.Planes))
        {
            plane.LateralM = -plane.LateralM;
        }
    }
}
