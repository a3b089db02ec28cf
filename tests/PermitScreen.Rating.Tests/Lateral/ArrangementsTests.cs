using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Tests.Support;

namespace PermitScreen.Rating.Tests.Lateral;

/// <summary>Places across the roadway against a search that knows only the rules: kerb distance, tyre gap, order (engineering rules A4, C1).</summary>
public sealed class ArrangementsTests
{
    private const double Rounding = 1e-9;
    private const double OtherWidth = 2.44;
    private static readonly LateralRules Rules = new(0.6, 1.2);

    [Theory]
    [InlineData(21)]
    [InlineData(22)]
    [InlineData(23)]
    [InlineData(24)]
    public void No_admissible_place_is_worse_than_the_worst_arrangement(int seed)
    {
        var random = new Random(seed);
        for (var i = 0; i < 200; i++)
        {
            var (roadway, width) = Random(random);
            var policy = Build.Policy(lateral: Rules);
            var arrangements = Arrangements.Of(roadway, width, Build.Mixed, policy, out _);
            if (arrangements.IsEmpty)
            {
                continue;
            }

            // The load on a plane is convex in each place: share times the extreme of one sense, or of the other where the share is negative.
            var unit = Build.Unit(roadway.LeftKerbM - 3 * random.NextDouble() + 1, roadway.RightKerbM + 3 * random.NextDouble() - 1);
            var permit = (Up: 100 * random.NextDouble(), Down: 100 * random.NextDouble());
            var other = (Up: 100 * random.NextDouble(), Down: 100 * random.NextDouble());
            var worst = arrangements.Max(a => Load(unit, a.PermitCentreM, a.OtherCentresM, a.MultiplePresence, permit, other));
            var most = arrangements.Max(a => a.OtherCentresM.Length);
            var room = roadway.WidthM - 2 * Rules.KerbDistanceM - width;
            Assert.Equal(Math.Min(roadway.LaneCount!.Value - 1, Math.Floor(room / (OtherWidth + Rules.TyreGapM))), most);
            for (var place = 0; place < 300; place++)
            {
                var (centre, others) = AnyPlace(random, roadway, width, random.Next(most + 1));
                var load = Load(unit, centre, others, policy.MultiplePresence[Math.Min(others.Count, 3)], permit, other);
                Assert.True(load <= worst + Rounding, FormattableString.Invariant($"{load} at {centre}, {string.Join(' ', others)}; worst arrangement {worst}"));
            }
        }
    }

    [Theory]
    [InlineData(31)]
    [InlineData(32)]
    public void Every_arrangement_keeps_the_rules(int seed)
    {
        var random = new Random(seed);
        for (var i = 0; i < 500; i++)
        {
            var (roadway, width) = Random(random);
            foreach (var a in Arrangements.Of(roadway, width, Build.Mixed, Build.Policy(lateral: Rules), out _))
            {
                var vehicles = a.OtherCentresM.Select(y => (Centre: y, Width: OtherWidth)).Append((Centre: a.PermitCentreM, Width: width)).OrderBy(v => v.Centre).ToList();
                Assert.True(vehicles[0].Centre - vehicles[0].Width / 2 >= roadway.LeftKerbM + Rules.KerbDistanceM - Rounding);
                Assert.True(vehicles[^1].Centre + vehicles[^1].Width / 2 <= roadway.RightKerbM - Rules.KerbDistanceM + Rounding);
                Assert.All(vehicles.Zip(vehicles.Skip(1)), p => Assert.True(p.Second.Centre - p.Second.Width / 2 - p.First.Centre - p.First.Width / 2 >= Rules.TyreGapM - Rounding));
                Assert.True(a.OtherCentresM.Length <= roadway.LaneCount - 1);
            }
        }
    }

    [Fact]
    public void All_vertices_are_there()
    {
        // 8 m between kerbs, 3 m and 2.44 m over tyres: between 0.6 m and 7.4 m lie 6.64 m of vehicles and gap, so 0.16 m of play.
        var roadway = new Roadway(0, 8, 2, null);
        var found = Arrangements.Of(roadway, 3, Build.Mixed, Build.Policy(lateral: Rules), out _)
            .Select(a => (Math.Round(a.PermitCentreM, 9), a.OtherCentresM.Select(y => (double?)Math.Round(y, 9)).SingleOrDefault(), a.MultiplePresence))
            .ToHashSet();
        var expected = new HashSet<(double, double?, double)>
        {
            (2.1, null, 1), (5.9, null, 1),
            (2.1, 6.02, 1), (2.1, 6.18, 1), (2.26, 6.18, 1),
            (5.9, 1.82, 1), (5.9, 1.98, 1), (5.74, 1.82, 1),
        };
        Assert.Equal(expected, found);
    }

    [Fact]
    public void Three_lanes_take_one_and_two_others_each_with_its_factor()
    {
        var roadway = new Roadway(-6, 6, 3, null);
        var arrangements = Arrangements.Of(roadway, 3, Build.Mixed, Build.Policy(lateral: Rules, presence: [1, 0.9, 0.8]), out _);
        Assert.Equal([0, 1, 2], arrangements.Select(a => a.OtherCentresM.Length).Distinct().Order());
        Assert.All(arrangements, a => Assert.Equal(new[] { 1, 0.9, 0.8 }[a.OtherCentresM.Length], a.MultiplePresence));
    }

    [Theory]
    [InlineData(8.0, 1, 3.0, ReasonCode.NoLaneBeside)]
    [InlineData(7.8, 2, 3.0, ReasonCode.NoLaneBeside)]
    [InlineData(8.0, null, 3.0, ReasonCode.DataMissing)]
    [InlineData(4.1, 2, 3.0, ReasonCode.NoRoomOnRoadway)]
    public void What_does_not_fit_is_told(double roadwayM, int? lanes, double widthM, ReasonCode code)
    {
        Assert.Empty(Arrangements.Of(new Roadway(0, roadwayM, lanes, null), widthM, Build.Mixed, Build.Policy(lateral: Rules), out var blocked));
        Assert.Equal(code, blocked?.Code);
    }

    [Theory]
    [InlineData(3.0, new[] { -0.3, 0.3 })]
    [InlineData(6.6, new[] { -0.1, 0.1 })]
    [InlineData(6.8, new[] { 0.0 })]
    public void On_the_centreline_the_tolerance_is_cut_by_the_kerbs(double widthM, double[] centres) =>
        Assert.Equal(centres, Arrangements.Of(new Roadway(-4, 4, 2, null), widthM, Build.Centreline, Build.Policy(lateral: Rules), out _).Select(a => Math.Round(a.PermitCentreM, 9) + 0.0));

    [Fact]
    public void The_centreline_is_the_roadways()
    {
        var arrangements = Arrangements.Of(new Roadway(-3, 5, 2, null), 3, Build.Centreline, Build.Policy(lateral: Rules), out _);
        Assert.Equal([0.7, 1.3], arrangements.Select(a => Math.Round(a.PermitCentreM, 9)));
    }

    private static (Roadway Roadway, double Width) Random(Random random)
    {
        var left = -6 + 3 * random.NextDouble();
        return (new Roadway(left, left + 4 + 12 * random.NextDouble(), random.Next(1, 6), null), 2 + 3 * random.NextDouble());
    }

    /// <summary>A random order of vehicles, the play shared out at random.</summary>
    private static (double Centre, List<double> Others) AnyPlace(Random random, Roadway roadway, double width, int others)
    {
        var permitPlace = random.Next(others + 1);
        var play = roadway.WidthM - 2 * Rules.KerbDistanceM - width - others * (OtherWidth + Rules.TyreGapM);
        var cuts = Enumerable.Range(0, others + 1).Select(_ => Math.Max(0, play) * random.NextDouble()).Order().ToList();
        var (centre, beside, taken) = (0.0, new List<double>(), roadway.LeftKerbM + Rules.KerbDistanceM);
        for (var i = 0; i <= others; i++)
        {
            var own = i == permitPlace ? width : OtherWidth;
            var at = taken + cuts[i] + own / 2;
            taken += own + Rules.TyreGapM;
            if (i == permitPlace)
            {
                centre = at;
            }
            else
            {
                beside.Add(at);
            }
        }

        return (centre, beside);
    }

    private static double Load(RatedUnit unit, double centre, IEnumerable<double> others, double presence, (double Up, double Down) permit, (double Up, double Down) other) =>
        presence * (OnPlane(Shares.Of(unit, "left", centre), permit) + others.Sum(y => OnPlane(Shares.Of(unit, "left", y), other)));

    private static double OnPlane(double share, (double Up, double Down) extreme) => Math.Max(share * extreme.Up, -share * extreme.Down);
}
