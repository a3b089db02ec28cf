using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Trusses;

/// <summary>Lines against CalculiX 2.20 (a general finite element solver): every member and reaction, loads on panel points, between them and on the deck's ends.</summary>
public class CcxTests
{
    /// <summary>Share of the largest ordinate; ccx prints seven digits.</summary>
    private const double Tolerance = 1e-5;

    private static readonly double[] Unequal = [5, 6, 7.5, 7.5, 6.5, 4];

    private static readonly double[] Polygonal = [4, 6, 8, 9, 8.5, 6.2, 4];

    private static readonly Dictionary<string, Func<TrussSketch>> Shapes = new(StringComparer.Ordinal)
    {
        ["simple Pratt"] = () => (Simple(ChordTruss.Pratt(6)) with { EndPosts = true }).Sketch(Uneven),
        ["double diagonals"] = () => Simple(Crossed(6)).Sketch(Uneven),
        ["continuous over three supports"] = () => ChordTruss.Of(Equal(12), Level(12), ChordTruss.Alternating(12), [0, 5, 12]).Sketch(Uneven),
        ["continuous with double diagonals, four supports"] = () => ChordTruss.Of(Equal(15), Level(15), Crossed(15), [0, 5, 10, 15]).Sketch(Uneven),
        ["deck truss"] = () => (Simple(ChordTruss.Howe(6)) with { DeckOnTop = true }).Sketch(Uneven),
        ["deck truss, seated deck ends"] = () => Ends((Simple(Crossed(6)) with { DeckOnTop = true }).Sketch(Uneven), DeckEndKind.SeatedOnAbutment, -4, 40.5),
        ["overhanging stringers"] = () => Ends(Simple(Crossed(6)).Sketch(Uneven), DeckEndKind.OverhangingStringers, -2.5, 38.25),
        ["hinged: cantilevers and suspended span"] = () =>
            (ChordTruss.Of(Equal(18), Level(18), ChordTruss.Alternating(18), [0, 6, 12, 18]) with { LowerGaps = [8, 10] }).Sketch(Uneven),
        ["unequal panels, polygonal chord"] = () => ChordTruss.Of(Unequal, Polygonal, ChordTruss.Pratt(6)).Sketch(Uneven),
        ["unequal panels, polygonal chord, double diagonals, middle support"] = () => ChordTruss.Of(Unequal, Polygonal, Crossed(6), [0, 3, 6]).Sketch(Uneven),
        ["both ends pinned"] = () => BothPinned(Simple(ChordTruss.Pratt(6)).Sketch(Uneven)),
    };

    public static TheoryData<string> Names => [.. Shapes.Keys];

    [NeedsCcxTheory]
    [MemberData(nameof(Names))]
    public void Every_ordinate_is_that_of_ccx(string name)
    {
        var (model, lines) = Shapes[name]().Solve();
        var loads = Loads(model).ToArray();
        var cases = Ccx.Solve(model, [.. loads.Select(load => load.OnJoints)]);
        var largest = 0.0;
        foreach (var line in Pairs.AllEffects(model, lines))
        {
            largest = Math.Max(largest, line.MaxAbs);
        }

        var worst = 0.0;
        for (var c = 0; c < cases.Length; c++)
        {
            for (var m = 0; m < model.Members.Length; m++)
            {
                Compare(lines.Axial(m), cases[c].AxialKn[m], loads[c].XM, model.Members[m].Name);
            }

            for (var s = 0; s < model.Supports.Length; s++)
            {
                Compare(lines.ReactionX(s), cases[c].ReactionXKn[s], loads[c].XM, model.Supports[s].Name + ", x");
                Compare(lines.ReactionY(s), cases[c].ReactionYKn[s], loads[c].XM, model.Supports[s].Name + ", y");
            }
        }

        Figures.Note($"mechanics.ccx[{name}].worst_share_of_largest", worst);

        void Compare(InfluenceLine? line, double ccx, double xM, string what)
        {
            if (line is null)
            {
                return;
            }

            var ours = line.At(xM, xM <= line.StartM ? Side.After : Side.Before);
            var off = Math.Abs(ours - ccx) / largest;
            Assert.True(off <= Tolerance, $"{what} at {xM} m: ours {ours:R}, ccx {ccx:R}");
            worst = Math.Max(worst, off);
        }
    }

    /// <summary>Unit loads along the deck and the joint loads they make: stringers are simple beams between panel points, or cantilevers beyond the last.</summary>
    private static IEnumerable<(double XM, Dictionary<string, double> OnJoints)> Loads(TrussModel model)
    {
        string[] names = [.. model.DeckPanelPoints];
        double[] x = [.. names.Select(name => model.Nodes.Single(node => node.Name == name).XM)];
        for (var i = 0; i < x.Length; i++)
        {
            yield return (x[i], new() { [names[i]] = 1 });
            if (i + 1 < x.Length)
            {
                yield return (x[i] + (0.3 * (x[i + 1] - x[i])), new() { [names[i]] = 0.7, [names[i + 1]] = 0.3 });
            }
        }

        if (model.Start.Kind == DeckEndKind.SeatedOnAbutment)
        {
            yield return (x[0] + (0.25 * (model.DeckStartM - x[0])), new() { [names[0]] = 0.75 });
            yield return (x[^1] + (0.25 * (model.DeckEndM - x[^1])), new() { [names[^1]] = 0.75 });
        }

        if (model.Start.Kind == DeckEndKind.OverhangingStringers)
        {
            var (first, last) = ((x[0] - model.DeckStartM) / (x[1] - x[0]), (model.DeckEndM - x[^1]) / (x[^1] - x[^2]));
            yield return (model.DeckStartM, new() { [names[0]] = 1 + first, [names[1]] = -first });
            yield return (model.DeckEndM, new() { [names[^1]] = 1 + last, [names[^2]] = -last });
        }
    }

    private static double[] Equal(int panels) => [.. Enumerable.Repeat(6.0, panels)];

    private static double[] Level(int panels) => [.. Enumerable.Repeat(7.0, panels + 1)];

    private static Diagonal[] Crossed(int panels) => [.. Enumerable.Repeat(Diagonal.Crossed, panels)];

    private static ChordTruss Simple(Diagonal[] web) => ChordTruss.Of(Equal(6), Level(6), web);

    /// <summary>Stiffness of the m-th member: uneven, so that a redundant truss shares its forces unevenly.</summary>
    private static double Uneven(int m) => 1e6 * (1 + (m * 7 % 5));

    private static TrussSketch Ends(TrussSketch sketch, DeckEndKind kind, double startM, double endM)
    {
        (sketch.Start, sketch.End) = (new DeckEnd(kind, startM), new DeckEnd(kind, endM));
        return sketch;
    }

    private static TrussSketch BothPinned(TrussSketch sketch)
    {
        sketch.Supports[^1] = sketch.Supports[^1] with { HoldsX = true };
        return sketch;
    }
}
