using PermitScreen.Mechanics.Lines;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Makes an influence line of the ordinates at the deck's panel points.</summary>
internal static class DeckLine
{
    /// <param name="model">The truss, for its panel points and deck ends.</param>
    /// <param name="ordinates">Ordinate at each deck panel point.</param>
    /// <param name="nothing">Ordinates not above this in size are 0.</param>
    internal static InfluenceLine Of(TrussModel model, ReadOnlySpan<double> ordinates, double nothing)
    {
        var points = ordinates.Length;
        var x = new List<double>(points + 2);
        var y = new List<double>(points + 2);
        for (var i = 0; i < points; i++)
        {
            x.Add(model.Nodes[model.PanelNodes[i]].XM);
            y.Add(Clean(ordinates[i]));
        }

        if (model.Start.Kind != DeckEndKind.EndFloorBeam)
        {
            var tip = model.Start.Kind == DeckEndKind.OverhangingStringers ? Beyond(x[1], y[1], x[0], y[0], model.Start.TipM) : 0;
            x.Insert(0, model.Start.TipM);
            y.Insert(0, Clean(tip));
        }

        if (model.End.Kind != DeckEndKind.EndFloorBeam)
        {
            var tip = model.End.Kind == DeckEndKind.OverhangingStringers ? Beyond(x[^2], y[^2], x[^1], y[^1], model.End.TipM) : 0;
            x.Add(model.End.TipM);
            y.Add(Clean(tip));
        }

        return InfluenceLine.FromPoints([.. x], [.. y]);

        double Clean(double ordinate) => Math.Abs(ordinate) <= nothing ? 0 : ordinate;
    }

    /// <summary>The straight line through the last two points, carried on to the tip.</summary>
    private static double Beyond(double innerM, double inner, double outerM, double outer, double tipM) =>
        outer + ((outer - inner) * ((tipM - outerM) / (outerM - innerM)));
}
