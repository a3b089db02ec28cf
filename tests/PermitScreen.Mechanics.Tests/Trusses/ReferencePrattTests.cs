using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Trusses;

/// <summary>The through Pratt truss of tests/reference/influence_lines.md: six panels of 6 m, 8 m high.</summary>
public class ReferencePrattTests
{
    private static readonly ChordTruss Pratt = ChordTruss.Of([6, 6, 6, 6, 6, 6], [8, 8, 8, 8, 8, 8, 8], ChordTruss.Pratt(6)) with { EndPosts = true };

    /// <summary>truss_pratt6_influence.csv; six printed decimals.</summary>
    [Fact]
    public void Ordinates_are_those_of_the_reference_table()
    {
        var worst = 0.0;
        foreach (var row in ReferenceTable.Read("truss_pratt6_influence.csv").Rows)
        {
            var line = Axial(row.Text("member"));
            var ordinate = line.At(row.Number("unit_load_at_bottom_panel_point") * 6, Side.Before);
            worst = Math.Max(worst, Math.Abs(ordinate - row.Number("axial_ordinate_tension_positive")));
        }

        Assert.InRange(worst, 0, 0.5e-6 + 1e-12);
        Figures.Note("mechanics.reference.truss_pratt6_influence.worst", worst);
    }

    /// <summary>truss_pratt6_max_forces.csv; three printed decimals, axle loads of the vehicle tables (three decimals too).</summary>
    [Fact]
    public void Largest_forces_are_those_of_the_reference_table()
    {
        var worst = 0.0;
        foreach (var row in ReferenceTable.Read("truss_pratt6_max_forces.csv").Rows)
        {
            var train = Vehicles.Named(row.Text("vehicle"));
            var line = Axial(row.Text("member"));
            worst = Math.Max(worst, Off(row, "max_axial_kn", line, train, Sense.Max));
            worst = Math.Max(worst, Off(row, "min_axial_kn", line, train, Sense.Min));
        }

        Figures.Note("mechanics.reference.truss_pratt6_max_forces.worst_kn", worst);
    }

    private static InfluenceLine Axial(string member)
    {
        var (model, lines) = Pratt.Sketch().Solve();
        return lines.Axial(model.Members.Select(m => m.Name).ToList().IndexOf(member));
    }

    private static double Off(ReferenceTable.Row row, string column, InfluenceLine line, AxleTrain train, Sense sense)
    {
        var found = SweepExtremes.Of(line, train, sense, TravelDirections.Both, WeighingRule.None).Value;
        var off = Math.Abs(found - row.Number(column));
        Assert.True(off <= 0.0005 + (1e-6 * Math.Abs(found)), $"{row.Text("vehicle")}, {row.Text("member")}, {column}: expected {row.Text(column)}, found {found:R}");
        return off;
    }
}
