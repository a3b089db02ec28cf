using CsCheck;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Trusses;

public class TrussModelTests
{
    private static TrussSketch Triangle() => new TrussSketch()
        .Joint("L0", 0, 0).Joint("L1", 6, 0).Joint("L2", 12, 0).Joint("U1", 6, 4)
        .Bar("L0", "L1").Bar("L1", "L2").Bar("L0", "U1").Bar("U1", "L2").Bar("U1", "L1")
        .Pin("L0").Roller("L2").Deck("L0", "L1", "L2");

    [Fact]
    public void A_sound_truss_has_no_faults() => Assert.Empty(Faults(Triangle()));

    [Fact]
    public void Every_fault_is_reported_at_once_with_its_field()
    {
        var sketch = Triangle().Joint("L1", 3, double.NaN).Joint("", 2e6, 1).Joint("X", 6, 4);
        sketch.Members[0] = new TrussMember("", "L0", "nowhere", 0);
        sketch.Members[1] = sketch.Members[1] with { AxialStiffnessKn = double.PositiveInfinity };
        sketch.Members.Add(new TrussMember("again", "L2", "U1", 1));
        sketch.Members.Add(new TrussMember("loop", "U1", "U1", 1));
        sketch.Supports.Add(new TrussSupport("idle", "L1", false, false));
        sketch.Supports.Add(new TrussSupport("idle", "L2", true, true));
        sketch.PanelPoints[2] = "L0";
        sketch.End = new DeckEnd(DeckEndKind.SeatedOnAbutment, double.NaN);
        sketch.Start = new DeckEnd(DeckEndKind.OverhangingStringers, 1);
        string[] expected =
        [
            "nodes[4].name", "nodes[4].y_m", "nodes[5].name", "nodes[5].x_m", "nodes[6].x_m",
            "members[0].name", "members[0].area_m2", "members[0].end_node", "members[1].area_m2", "members[5].end_node", "members[6].end_node",
            "supports[2].holds_vertical", "supports[3].name", "supports[3].node",
            "deck.panel_points[2]", "deck.start.tip_m", "deck.end.tip_m",
        ];
        Assert.Equal(expected.Order(StringComparer.Ordinal), Faults(sketch).Select(fault => fault.Path).Order(StringComparer.Ordinal));
    }

    [Fact]
    public void A_joint_without_member_and_parts_apart_are_named()
    {
        var sketch = Triangle().Joint("lone", 20, 0).Joint("A", 30, 0).Joint("B", 36, 0).Bar("A", "B");
        var faults = Faults(sketch);
        Assert.Equal(["nodes[4].name", "members"], faults.Select(fault => fault.Path));
        Assert.Equal("joint 'lone' has no member", faults[0].Message);
        Assert.Contains("{L0, L1, L2, U1} and {A, B}", faults[1].Message, StringComparison.Ordinal);
    }

    [Fact]
    public void A_member_between_joints_at_one_place_has_no_length()
    {
        var sketch = Triangle().Joint("V", 6 + 1e-9, 4).Bar("U1", "V").Bar("V", "L2");
        Assert.Equal(["nodes[4].x_m", "members[5].end_node"], Faults(sketch).Select(fault => fault.Path));
    }

    [Fact]
    public void The_deck_reaches_to_panel_point_seat_or_tip()
    {
        var sketch = Triangle();
        sketch.Start = new DeckEnd(DeckEndKind.SeatedOnAbutment, -3);
        sketch.End = new DeckEnd(DeckEndKind.EndFloorBeam, double.NaN);
        var model = sketch.Model();
        Assert.Equal((-3.0, 12.0), (model.DeckStartM, model.DeckEndM));
    }

    [Fact]
    public void Nothing_at_all_is_refused()
    {
        var paths = Faults(new TrussSketch()).Select(fault => fault.Path);
        Assert.Equal(["nodes", "members", "supports", "deck.panel_points"], paths);
    }

    /// <summary>Whatever is thrown at the door: a model or faults, never both, never an exception; and a model is solved or refused.</summary>
    [Fact]
    public void Any_numbers_and_names_give_a_model_or_faults()
    {
        var number = Gen.OneOf(
            OneOf(double.NaN, double.PositiveInfinity, double.NegativeInfinity, 0, -0.0, double.Epsilon, double.MaxValue, double.MinValue, 1e-300, 1e300, -1),
            Gen.Double,
            Gen.Double[-20, 20],
            Gen.Int[0, 3].Select(i => 6.0 * i));
        var name = OneOf("", " ", "A", "B", "C", "D", "E", null!);
        var node = Gen.Select(name, number, number, (n, x, y) => new TrussNode(n, x, y));
        var member = Gen.Select(name, name, name, number, (n, a, b, ea) => new TrussMember(n, a, b, ea));
        var support = Gen.Select(name, name, Gen.Bool, Gen.Bool, (n, at, x, y) => new TrussSupport(n, at, x, y));
        var end = Gen.Select(Gen.Int[-1, 3], number, (kind, tip) => new DeckEnd((DeckEndKind)kind, tip));
        Gen.Select(node.List[0, 6], member.List[0, 9], support.List[0, 3], name.List[0, 4], end, end).Sample(
            (nodes, members, supports, points, start, finish) =>
            {
                var sketch = Triangle();
                Replace(sketch.Nodes, nodes);
                Replace(sketch.Members, members);
                Replace(sketch.Supports, supports);
                Replace(sketch.PanelPoints, points);
                (sketch.Start, sketch.End) = (start, finish);
                ModelOrFaults(sketch);
            },
            iter: 20_000);
    }

    /// <summary>The same with one number of a sound truss replaced, so that more gets past the door.</summary>
    [Fact]
    public void One_strange_number_gives_a_model_or_faults()
    {
        double[] strange = [double.NaN, double.PositiveInfinity, double.NegativeInfinity, double.Epsilon, double.MaxValue, 1e-300, 1e-12, 1e12, 999_999, -999_999, 6, 12, 0];
        foreach (var value in strange)
        {
            for (var place = 0; place < 4 + 4 + 5; place++)
            {
                var sketch = Triangle();
                if (place < 4)
                {
                    sketch.Nodes[place] = sketch.Nodes[place] with { XM = value };
                }
                else if (place < 8)
                {
                    sketch.Nodes[place - 4] = sketch.Nodes[place - 4] with { YM = value };
                }
                else
                {
                    sketch.Members[place - 8] = sketch.Members[place - 8] with { AxialStiffnessKn = value };
                }

                ModelOrFaults(sketch);
            }
        }
    }

    private static Gen<T> OneOf<T>(params T[] values) => Gen.Int[0, values.Length - 1].Select(i => values[i]);

    private static void ModelOrFaults(TrussSketch sketch)
    {
        var faults = new FaultList();
        var model = sketch.TryModel(faults);
        Assert.Equal(model is null, faults.Any);
        if (model is not null && TrussLines.TrySolve(model, faults) is { } lines)
        {
            Assert.False(faults.Any);
            Assert.InRange(JointBalance.Worst(model, lines), 0, 1e-9);
        }
        else
        {
            Assert.True(faults.Any);
        }
    }

    /// <summary>Only the first few are replaced by strange ones: a truss of strangers alone never gets past the door.</summary>
    private static void Replace<T>(List<T> sound, List<T> strange)
    {
        if (strange.Count > 0 && strange.Count < sound.Count)
        {
            sound.RemoveRange(0, strange.Count);
            sound.AddRange(strange);
        }
        else if (strange.Count >= sound.Count)
        {
            sound.Clear();
            sound.AddRange(strange);
        }
    }

    private static IReadOnlyList<Fault> Faults(TrussSketch sketch)
    {
        var faults = new FaultList();
        Assert.Equal(sketch.TryModel(faults) is null, faults.Any);
        return faults.All;
    }
}
