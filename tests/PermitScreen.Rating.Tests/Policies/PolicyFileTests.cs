using System.Globalization;
using System.Text.Json.Nodes;

namespace PermitScreen.Rating.Tests.Policies;

/// <summary>
/// The policy files' numbers against tests/reference: mbe_permit_load_factors.csv (edition 2013 interim and later), rating_factors.csv,
/// vehicles_us.csv. Two lists written down apart from each other; both say "from memory, not recomputed".
/// </summary>
public sealed class PolicyFileTests
{
    private const double KnPerMOfKipPerFt = 4.4482216152605 / 0.3048;

    public static TheoryData<string> Files() => ["deploy/policies/lrfr-permit-2013.json", "deploy/demo/policies/ossel-demo.json"];

    [Theory]
    [MemberData(nameof(Files))]
    public void Live_load_factors_are_those_of_the_table(string file)
    {
        var rows = Policy(file)["liveLoadRows"]!.AsArray();
        var expected = ReferenceTable.Read("mbe_permit_load_factors.csv").Rows.Where(r => r["edition"] == "2013 interim and later").ToList();
        foreach (var reference in expected)
        {
            var mixed = reference["loading_condition"] == "mix with traffic";
            var row = rows.Single(r =>
                (string)r!["permitKind"]! == Kind(reference)
                && (string)r["otherTraffic"]! == (mixed ? "OTHER_TRAFFIC_MIXED" : "OTHER_TRAFFIC_NONE"))!;
            Assert.Equal(reference["distribution"] == "one lane" ? "SHARE_BASIS_ONE_LANE" : "SHARE_BASIS_TWO_OR_MORE_LANES", (string)row["shareBasis"]!);
            var factor = row["factors"]!.AsArray().Single(f =>
                (double?)f!["adttOneDirection"] == Adtt(reference["adtt_one_direction"])
                && Same((double?)f["upToGvwOverLengthKnPerM"], UpTo(reference["weight_class"])))!;
            Assert.Equal(Number(reference["live_load_factor"]), (double)factor["factor"]!);
        }

        Assert.Equal(expected.Count, rows.Sum(r => r!["factors"]!.AsArray().Count));
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void Dead_load_factors_are_those_of_the_table(string file)
    {
        var factors = Policy(file)["deadLoadFactors"]!.AsArray().ToDictionary(f => (string)f!["component"]!, f => f!);
        foreach (var (item, component, field) in new[]
        {
            ("DC (Strength I and II)", "DC", "adverse"), ("DC minimum (uplift or relieving)", "DC", "relieving"),
            ("DC (Strength I and II)", "DC1", "adverse"), ("DC minimum (uplift or relieving)", "DC1", "relieving"),
            ("DC (Strength I and II)", "DC2", "adverse"), ("DC minimum (uplift or relieving)", "DC2", "relieving"),
            ("DW (Strength I and II)", "DW", "adverse"), ("DW minimum (uplift or relieving)", "DW", "relieving"),
        })
        {
            Assert.Equal(Reference("LRFR load factor", item), (double)factors["DEAD_LOAD_COMPONENT_" + component][field]!);
        }
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void Condition_system_and_floor_are_those_of_the_table(string file)
    {
        var rules = Policy(file)["capacityRules"]!;
        var bands = rules["conditionFactors"]!.AsArray().ToDictionary(b => (int)b!["fromRating"]!, b => (double)b!["factor"]!);
        Assert.Equal(3, bands.Count);
        Assert.Equal(Reference("condition factor", "good or satisfactory (superstructure rating 6 or more)"), bands[6]);
        Assert.Equal(Reference("condition factor", "fair (5)"), bands[5]);
        Assert.Equal(Reference("condition factor", "poor (4 or less)"), bands[0]);
        var systems = rules["systemFactors"]!.AsArray().ToDictionary(s => (string)s!["system"]!, s => (double)s!["factor"]!);
        foreach (var (item, kind) in new[]
        {
            ("welded members in two-girder / truss / arch bridges", "WELDED_TWO_PLANE"),
            ("riveted members in two-girder / truss / arch bridges", "RIVETED_TWO_PLANE"),
            ("multiple eyebar members in truss bridges", "MULTIPLE_EYEBARS"),
            ("three-girder bridges with girder spacing 6 ft", "THREE_GIRDER"),
            ("four-girder bridges with girder spacing up to 4 ft", "FOUR_GIRDER_CLOSE"),
            ("all other girder and slab bridges", "OTHER_GIRDER_OR_SLAB"),
            ("floor beams spaced more than 12 ft with non-continuous stringers", "FLOOR_BEAMS_WIDE"),
            ("redundant stringer subsystems between floor beams", "REDUNDANT_STRINGERS"),
        })
        {
            Assert.Equal(Reference("system factor", item), systems["SYSTEM_KIND_" + kind]);
        }

        Assert.Equal(8, systems.Count);
        Assert.Equal(Reference("floor", "condition factor times system factor at least"), (double)rules["factorFloor"]!);
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void Allowances_and_multiple_presence_are_those_of_the_table(string file)
    {
        var policy = Policy(file);
        var general = Reference("dynamic load allowance", "general");
        var allowances = policy["rungs"]!.AsArray().Select(r => (double)r!["allowance"]!["constant"]!).ToArray();
        Assert.Equal([general, general, general, Reference("dynamic load allowance", "permit vehicle at 10 mph or less")], allowances);
        Assert.Equal(general, (double)policy["otherLaneLoad"]!["allowance"]!["constant"]!);

        // One vehicle alone has 1.00: the table's 1.20 belongs to the formulas, not to shares by statics (engineering rule B3).
        var presence = policy["multiplePresence"]!.AsArray().ToDictionary(p => (int)p!["lanesLoaded"]!, p => (double)p!["factor"]!);
        Assert.Equal([1, 2, 3, 4], presence.Keys.Order());
        Assert.Equal(1.0, presence[1]);
        Assert.Equal(Reference("multiple presence LRFD", "2 lanes"), presence[2]);
        Assert.Equal(Reference("multiple presence LRFD", "3 lanes"), presence[3]);
        Assert.Equal(Reference("multiple presence LRFD", "4 lanes or more"), presence[4]);
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void The_vehicle_beside_is_Type_3_3_with_its_factor(string file)
    {
        var other = Policy(file)["otherLaneLoad"]!;
        var reference = ReferenceTable.Read("vehicles_us.csv").Rows.Single(v => v["vehicle"] == "Type 3-3");
        var axles = other["vehicle"]!["axles"]!.AsArray();
        Assert.Equal(reference["axle_loads_kn"].Split(' ').Select(Number), axles.Select(a => (double)a!["loadKn"]!));
        var spacing = 0.0;
        foreach (var (axle, gap) in axles.Skip(1).Zip(reference["spacings_m"].Split(' ').Select(Number)))
        {
            spacing += gap;
            Assert.Equal(spacing, (double)axle!["offsetM"]!, 9);
        }

        Assert.Equal(Reference("LRFR load factor", "LL legal routine ADTT > 5000 or unknown"), (double)other["liveLoadFactor"]!);
    }

    [Theory]
    [MemberData(nameof(Files))]
    public void The_uniform_load_is_that_of_the_permit_rules(string file)
    {
        // tests/reference/loads_and_rating.md, LRFR: 0.2 kip/ft in its lane, spans over 200 ft.
        var load = Policy(file)["sameLaneLoad"]!;
        Assert.Equal(0.2 * KnPerMOfKipPerFt, (double)load["loadKnPerM"]!, 4);
        Assert.Equal(200 * 0.3048, (double)load["forSpansOverM"]!, 9);
    }

    private static JsonNode Policy(string file) => JsonNode.Parse(File.ReadAllText(Repository.Path(file.Split('/'))))!["policy"]!;

    private static double Reference(string group, string item) =>
        Number(ReferenceTable.Read("rating_factors.csv").Rows.Single(r => r["group"] == group && r["item"] == item)["value"]);

    private static string Kind(ReferenceTable.Row row) => (row["permit_type"], row["frequency"]) switch
    {
        ("routine or annual", _) => "PERMIT_KIND_ROUTINE",
        (_, "single trip") => "PERMIT_KIND_SPECIAL_SINGLE_TRIP",
        _ => "PERMIT_KIND_SPECIAL_MULTIPLE_TRIPS",
    };

    private static double? Adtt(string cell) => cell switch
    {
        "> 5000" => 5000,
        "= 1000" => 1000,
        "< 100" => 100,
        _ => null,
    };

    private static double? UpTo(string cell) => cell switch
    {
        "GVW/AL < 2.0 kip/ft" => 2 * KnPerMOfKipPerFt,
        "2.0 < GVW/AL < 3.0 kip/ft" => 3 * KnPerMOfKipPerFt,
        _ => null,
    };

    private static bool Same(double? found, double? expected) =>
        found is { } one && expected is { } other ? Math.Abs(one - other) < 1e-6 * other : found is null && expected is null;

    private static double Number(string cell) => double.Parse(cell, CultureInfo.InvariantCulture);
}
