using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Trusses;

/// <summary>Determinate trusses against sections and joints (statics, worked in <see cref="Sections"/> without any stiffness).</summary>
public class ClosedFormTests
{
    private const double Tolerance = 1e-9;

    private static readonly double[] Unequal = [5, 6, 7.5, 7.5, 6.5, 4];

    private static readonly double[] Polygonal = [0, 6, 8, 9, 8.5, 6.2, 0];

    private static readonly Dictionary<string, ChordTruss> Shapes = new(StringComparer.Ordinal)
    {
        ["through Pratt"] = ChordTruss.Of(Equal(6, 6), Level(6, 8), ChordTruss.Pratt(6)) with { EndPosts = true },
        ["through Howe"] = ChordTruss.Of(Equal(8, 5), Level(8, 7), ChordTruss.Howe(8)) with { EndPosts = true },
        ["through Warren with verticals"] = ChordTruss.Of(Equal(8, 7), Level(8, 9), ChordTruss.Alternating(8)) with { EndPosts = true },
        ["deck Pratt"] = ChordTruss.Of(Equal(6, 6), Level(6, 5), ChordTruss.Pratt(6)) with { DeckOnTop = true },
        ["deck Howe"] = ChordTruss.Of(Equal(6, 6), Level(6, 5), ChordTruss.Howe(6)) with { DeckOnTop = true },
        ["deck Warren with verticals"] = ChordTruss.Of(Equal(10, 4), Level(10, 5), ChordTruss.Alternating(10)) with { DeckOnTop = true },
        ["through Pratt, polygonal, unequal panels"] = ChordTruss.Of(Unequal, Polygonal, ChordTruss.Pratt(6)) with { EndPosts = true },
        ["through Howe, polygonal, unequal panels"] = ChordTruss.Of(Unequal, Polygonal, ChordTruss.Howe(6)) with { EndPosts = true },
        ["through Warren, polygonal, unequal panels"] = ChordTruss.Of(Unequal, Polygonal, ChordTruss.Alternating(6)) with { EndPosts = true },
        ["deck Pratt, polygonal"] = ChordTruss.Of(Unequal, [4, 5, 6, 6.5, 6, 5, 4.5], ChordTruss.Pratt(6)) with { DeckOnTop = true },
        ["two cantilevers and a suspended span"] = Cantilever() with { LowerGaps = [8, 11] },
        ["cantilevers hinged in the upper chord, on deck"] = Cantilever() with { UpperGaps = [7, 12], DeckOnTop = true },
        ["overhanging truss"] = ChordTruss.Of(Equal(8, 5), Level(8, 6), ChordTruss.Pratt(8), [2, 6]),
    };

    public static TheoryData<string> Names => [.. Shapes.Keys];

    [Theory]
    [MemberData(nameof(Names))]
    public void Member_forces_and_reactions_are_those_of_sections_and_joints(string name)
    {
        var shape = Shapes[name];
        var (model, lines) = shape.Sketch().Solve();
        var worst = 0.0;
        foreach (var panelPoint in model.DeckPanelPoints)
        {
            var point = int.Parse(panelPoint[1..], System.Globalization.CultureInfo.InvariantCulture);
            var sections = new Sections(shape, point);
            for (var m = 0; m < model.Members.Length; m++)
            {
                worst = Math.Max(worst, Compare(sections.Force(model.Members[m].Name), lines.Axial(m), shape.PointsM[point], $"{model.Members[m].Name} at {panelPoint}"));
            }

            for (var s = 0; s < model.Supports.Length; s++)
            {
                worst = Math.Max(worst, Compare(sections.Reaction(s), lines.ReactionY(s)!, shape.PointsM[point], $"reaction {s} at {panelPoint}"));
            }

            Assert.Equal(0, InwardOrdinate(lines.ReactionX(0)!, shape.PointsM[point]), 1e-12);
        }

        Figures.Note($"mechanics.closed_form[{name}].worst", worst);
    }

    /// <summary>Warren without verticals: chords M/h at the joint opposite, diagonals ±V/sin of their slope (statics).</summary>
    [Fact]
    public void Warren_without_verticals_follows_moment_over_height_and_shear_over_sine()
    {
        const int Panels = 6;
        const double PanelM = 7, HeightM = 6, SpanM = Panels * PanelM;
        var sketch = new TrussSketch();
        for (var i = 0; i <= Panels; i++)
        {
            sketch.Joint($"L{i}", i * PanelM, 0);
        }

        for (var i = 0; i < Panels; i++)
        {
            sketch.Joint($"U{i}", (i + 0.5) * PanelM, HeightM).Bar($"L{i}", $"L{i + 1}").Bar($"L{i}", $"U{i}").Bar($"U{i}", $"L{i + 1}");
        }

        for (var i = 0; i + 1 < Panels; i++)
        {
            sketch.Bar($"U{i}", $"U{i + 1}");
        }

        var (model, lines) = sketch.Pin("L0").Roller($"L{Panels}").Deck([.. Enumerable.Range(0, Panels + 1).Select(i => $"L{i}")]).Solve();
        var sine = HeightM / Math.Sqrt((HeightM * HeightM) + (PanelM * PanelM / 4));
        for (var p = 0; p <= Panels; p++)
        {
            var loadM = p * PanelM;
            for (var i = 0; i < Panels; i++)
            {
                var shear = 1 - (loadM / SpanM) - (loadM <= i * PanelM ? 1 : 0);
                Expect($"L{i}L{i + 1}", loadM, Moment((i + 0.5) * PanelM, loadM) / HeightM);
                Expect($"L{i}U{i}", loadM, -shear / sine);
                Expect($"U{i}L{i + 1}", loadM, shear / sine);
                if (i > 0)
                {
                    Expect($"U{i - 1}U{i}", loadM, -Moment(i * PanelM, loadM) / HeightM);
                }
            }
        }

        void Expect(string member, double loadM, double expected) =>
            Compare(expected, lines.Axial(model.Members.Select(m => m.Name).ToList().IndexOf(member)), loadM, member);

        static double Moment(double xM, double loadM) => ((1 - (loadM / SpanM)) * xM) - Math.Max(xM - loadM, 0);
    }

    private static double[] Equal(int panels, double panelM) => [.. Enumerable.Repeat(panelM, panels)];

    private static double[] Level(int panels, double heightM) => [.. Enumerable.Repeat(heightM, panels + 1)];

    private static ChordTruss Cantilever() => ChordTruss.Of(
        Equal(20, 6),
        [6, 7, 8, 9, 10, 12, 13, 12, 10, 9, 9, 9, 10, 12, 13, 12, 10, 9, 8, 7, 6],
        [.. Enumerable.Range(0, 20).Select(i => i is < 3 or (>= 6 and < 10) or (>= 14 and < 17) ? Diagonal.Falling : Diagonal.Rising)],
        [0, 6, 14, 20]);

    private static double Compare(double expected, InfluenceLine line, double xM, string what)
    {
        var difference = Math.Abs(InwardOrdinate(line, xM) - expected);
        Assert.True(difference <= Tolerance, $"{what}: expected {expected:R}, found {InwardOrdinate(line, xM):R}");
        return difference;
    }

    /// <summary>The ordinate at a panel point; at the end of the deck the one on the deck.</summary>
    private static double InwardOrdinate(InfluenceLine line, double xM) => line.At(xM, xM <= line.StartM ? Side.After : Side.Before);
}
