using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Trusses of all shapes from a seeded generator: simple, overhanging, continuous, hinged, redundant, unequal panels, every deck end.</summary>
internal static class RandomTruss
{
    /// <summary>A truss that stands, with its lines.</summary>
    internal static (TrussModel Model, TrussLines Lines) Solved(Random random)
    {
        while (true)
        {
            // A hinge in an unlucky panel makes a mechanism; then another truss is drawn.
            var model = Sketch(random).Model();
            if (TrussLines.TrySolve(model, new FaultList()) is { } lines)
            {
                return (model, lines);
            }
        }
    }

    internal static TrussSketch Sketch(Random random)
    {
        var round = random.Next(2) == 0;
        var spans = random.Next(10) switch { < 5 => 1, < 8 => 2, _ => 3 };
        int[] panels = [.. Enumerable.Range(0, spans).Select(_ => random.Next(spans == 1 ? 2 : 3, spans == 1 ? 13 : 8))];
        int[] supports = [0, .. panels.Select((_, i) => panels[..(i + 1)].Sum())];
        var count = supports[^1];
        var equalM = Length(4, 9);
        var unequal = random.Next(2) == 0;
        var levelM = Length(4, 10);
        var polygonal = random.Next(2) == 0;
        var truss = ChordTruss.Of(
            [.. Enumerable.Range(0, count).Select(_ => unequal ? Length(3, 9) : equalM)],
            [.. Enumerable.Range(0, count + 1).Select(_ => polygonal ? Length(4, 10) : levelM)],
            Web(random, count),
            supports);
        truss = truss with { DeckOnTop = random.Next(3) == 0 };
        if (spans > 1 && random.Next(2) == 0)
        {
            truss = WithHinges(random, truss);
        }
        else if (spans == 1 && count > 4 && random.Next(4) == 0)
        {
            truss = truss with { SupportedPoints = [1, count - 1] };
        }
        else if (spans == 1 && !truss.DeckOnTop)
        {
            truss = truss with { EndPosts = random.Next(2) == 0 };
        }

        var sketch = truss.Sketch(_ => 5e5 * (1 + (5 * random.NextDouble())));
        var (firstM, lastM) = (sketch.Nodes.Single(n => n.Name == sketch.PanelPoints[0]).XM, sketch.Nodes.Single(n => n.Name == sketch.PanelPoints[^1]).XM);
        sketch.Start = End(firstM, -1);
        sketch.End = End(lastM, 1);
        return sketch;

        double Length(double fromM, double toM) =>
            round ? Math.Round((fromM + (random.NextDouble() * (toM - fromM))) * 2) / 2 : fromM + (random.NextDouble() * (toM - fromM));

        DeckEnd End(double panelPointM, int outwards) => new((DeckEndKind)random.Next(3), panelPointM + (outwards * Length(0.5, 5)));
    }

    private static Diagonal[] Web(Random random, int panels) => random.Next(5) switch
    {
        0 => ChordTruss.Pratt(panels),
        1 => ChordTruss.Howe(panels),
        2 => ChordTruss.Alternating(panels),
        3 => [.. Enumerable.Range(0, panels).Select(_ => Diagonal.Crossed)],
        _ => [.. Enumerable.Range(0, panels).Select(_ => (Diagonal)random.Next(3))],
    };

    private static ChordTruss WithHinges(Random random, ChordTruss truss)
    {
        // One gap for each support beyond two, each in a span of its own.
        var gaps = Enumerable.Range(1, truss.SupportedPoints.Length - 2)
            .Select(s => truss.SupportedPoints[s] + 1 + random.Next(truss.SupportedPoints[s + 1] - truss.SupportedPoints[s] - 2)).ToArray();
        return random.Next(2) == 0 ? truss with { LowerGaps = gaps } : truss with { UpperGaps = gaps };
    }
}
