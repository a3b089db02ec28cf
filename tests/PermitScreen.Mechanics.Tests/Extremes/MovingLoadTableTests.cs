using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Tests.Support;

namespace PermitScreen.Mechanics.Tests.Extremes;

/// <summary>Published and recomputed tables of moving loads on simple spans (tests/reference), through truss lines; see <see cref="KingPost"/>.</summary>
public class MovingLoadTableTests
{
    private static readonly AxleTrain Hs20 = Vehicles.Named("HS20 truck (14 ft rear)");

    private static readonly AxleTrain Tandem = Vehicles.Named("HL-93 tandem");

    /// <summary>hs20_simple_span.csv: AASHTO's own table (0.15 kip-ft, 0.1 kip), the truck and lane columns (printed digits).</summary>
    [Fact]
    public void Hs20_table()
    {
        double worstPublished = 0, worstComputed = 0;
        foreach (var row in ReferenceTable.Read("hs20_simple_span.csv").Rows)
        {
            var spanM = row.Number("span_ft") * Units.FtM;
            var truck = MomentKipFt(spanM, row.Number("truck_critical_section_ft") * Units.FtM, Hs20);
            var (lane, shear, laneShear) = (LaneMomentKipFt(spanM), ShearKip(spanM, Hs20), LaneShearKip(spanM));
            worstComputed = Math.Max(worstComputed, Off(row, "truck_moment_kipft", truck, 0.0005));
            worstComputed = Math.Max(worstComputed, Off(row, "lane_moment_kipft", lane, 0.005));
            worstComputed = Math.Max(worstComputed, Off(row, "truck_shear_kip", shear, 0.0005));
            worstComputed = Math.Max(worstComputed, Off(row, "lane_shear_kip", laneShear, 0.005));
            worstComputed = Math.Max(worstComputed, Off(row, "max_moment_knm", Math.Max(truck, lane) * Units.KipFtKnm, 0.005));
            foreach (var (column, found, tolerance) in (ReadOnlySpan<(string, double, double)>)[
                ("aashto_moment_kipft", Math.Max(truck, lane), 0.15),
                ("aashto_end_shear_kip", Math.Max(shear, laneShear), 0.1),
                ("khan_truck_moment_kipft", truck, 0.1),
                ("khan_truck_shear_kip", shear, 0.1)])
            {
                // Where the published figure is missing the cell is empty.
                worstPublished = row.Has(column) ? Math.Max(worstPublished, Off(row, column, found, tolerance)) : worstPublished;
            }
        }

        Figures.Note("mechanics.table.hs20.published.worst_kipft_or_kip", worstPublished);
        Figures.Note("mechanics.table.hs20.computed.worst_kipft_or_kip", worstComputed);
    }

    /// <summary>hs15_simple_span.csv: 0.75 of HS20.</summary>
    [Fact]
    public void Hs15_table()
    {
        foreach (var row in ReferenceTable.Read("hs15_simple_span.csv").Rows)
        {
            var spanM = row.Number("span_ft") * Units.FtM;
            var moment = row.Text("moment_governs") == "lane" ? 0.75 * LaneMomentKipFt(spanM) : AbsoluteMomentKipFt(spanM, Hs20.ScaledBy(0.75));
            Off(row, "max_moment_kipft", moment, 0.005, 1e-5);
            var shear = row.Text("shear_governs") == "lane" ? 0.75 * LaneShearKip(spanM) : ShearKip(spanM, Hs20.ScaledBy(0.75));
            Off(row, "max_end_shear_kip", shear, 0.005);
        }
    }

    /// <summary>hl93_simple_span.csv and mbe_example_a1_live_load.csv: components of the design load.</summary>
    [Fact]
    public void Hl93_components()
    {
        foreach (var row in ReferenceTable.Read("hl93_simple_span.csv").Rows)
        {
            var spanM = row.Number("span_ft") * Units.FtM;
            Off(row, "truck_abs_max_moment_kipft", AbsoluteMomentKipFt(spanM, Hs20), 0.0005, 1e-5);
            Off(row, "tandem_abs_max_moment_kipft", AbsoluteMomentKipFt(spanM, Tandem), 0.0005, 1e-5);
            Off(row, "truck_midspan_moment_kipft", MomentKipFt(spanM, spanM / 2, Hs20), 0.0005);
            Off(row, "tandem_midspan_moment_kipft", MomentKipFt(spanM, spanM / 2, Tandem), 0.0005);
            Off(row, "truck_end_shear_kip", ShearKip(spanM, Hs20), 0.0005);
            Off(row, "tandem_end_shear_kip", ShearKip(spanM, Tandem), 0.0005);
            Off(row, "lane_midspan_moment_kipft", 0.64 / Units.FtM * new KingPost(spanM, spanM / 2).Moment.PositiveArea / Units.FtM, 0.0005);
            Off(row, "lane_end_shear_kip", 0.64 / Units.FtM * new KingPost(spanM, spanM / 2).EndReaction.PositiveArea, 0.0005);
        }

        var example = ReferenceTable.Read("mbe_example_a1_live_load.csv").Rows;
        Off(example.Single(row => row.Text("quantity") == "truck midspan moment"), "published", MomentKipFt(65 * Units.FtM, 32.5 * Units.FtM, Hs20), 0.05);
        Off(example.Single(row => row.Text("quantity") == "tandem midspan moment"), "published", MomentKipFt(65 * Units.FtM, 32.5 * Units.FtM, Tandem), 0.05);
    }

    /// <summary>vehicles_us_simple_span.csv: legal, hauling, notional, emergency and design trucks.</summary>
    [Fact]
    public void Us_vehicles()
    {
        var worst = 0.0;
        foreach (var row in ReferenceTable.Read("vehicles_us_simple_span.csv").Rows)
        {
            var (spanM, train) = (row.Number("span_ft") * Units.FtM, Vehicles.Named(row.Text("vehicle")));
            Off(row, "abs_max_moment_kipft", MomentKipFt(spanM, row.Number("critical_section_ft") * Units.FtM, train), 0.0005, 2e-6);
            Off(row, "max_end_shear_kip", ShearKip(spanM, train), 0.0005);
            Off(row, "max_pier_reaction_two_equal_spans_kip", PierKip(spanM, train), 0.0005);
            worst = Math.Max(worst, (AbsoluteMomentKipFt(spanM, train) / row.Number("abs_max_moment_kipft")) - 1);
        }

        Assert.InRange(worst, -1, 1e-5);
    }

    /// <summary>vehicles_en1991_simple_span.csv: special vehicles of EN 1991-2 Annex A, static.</summary>
    [Fact]
    public void Eurocode_vehicles()
    {
        foreach (var row in ReferenceTable.Read("vehicles_en1991_simple_span.csv").Rows)
        {
            var (spanM, train) = (row.Number("span_m"), Vehicles.Named("EN 1991-2 " + row.Text("class")));
            Off(row, "abs_max_moment_static_knm", MomentKipFt(spanM, row.Number("critical_section_m"), train) * Units.KipFtKnm, 0.006, 2e-6);
            Off(row, "max_end_shear_static_kn", ShearKip(spanM, train) * Units.KipKn, 0.006);
            Off(row, "max_pier_reaction_two_equal_spans_kn", PierKip(spanM, train) * Units.KipKn, 0.006);
        }
    }

    /// <summary>cooper_e80_simple_span.csv, one rail: two locomotives and the trailing 8 kip/ft as axles every quarter of a foot (within the table's 0.03 %).</summary>
    [Fact]
    public void Cooper_e80()
    {
        var worst = 0.0;
        var train = CooperE80(trailingFt: 150);
        foreach (var row in ReferenceTable.Read("cooper_e80_simple_span.csv").Rows.Where(row => row.Number("span_ft") <= 100))
        {
            var spanM = row.Number("span_ft") * Units.FtM;
            Share("max_midspan_moment_kipft_per_rail", MomentKipFt(spanM, spanM / 2, train));
            Share("max_end_shear_kip_per_rail", ShearKip(spanM, train));
            Share("max_pier_reaction_kip_per_rail", PierKip(spanM, train));

            void Share(string column, double found)
            {
                Off(row, column, found, 0.05, 3e-4);
                worst = Math.Max(worst, Math.Abs(found - row.Number(column)) / row.Number(column));
            }
        }

        Figures.Note("mechanics.table.cooper_e80.worst_relative", worst);
    }

    private static AxleTrain CooperE80(int trailingFt)
    {
        double[] loadsKip = [40, 80, 80, 80, 80, 52, 52, 52, 52];
        double[] gapsFt = [8, 5, 5, 5, 9, 5, 6, 5];
        const int PerFt = 4;
        var trailing = Enumerable.Repeat(8.0 / PerFt, trailingFt * PerFt).ToArray();
        return Vehicles.Of(
            loadsKip.Concat(loadsKip).Concat(trailing).Select(kip => kip / 2 * Units.KipKn),
            gapsFt.Append(8).Concat(gapsFt).Append(5 + (0.5 / PerFt)).Concat(Enumerable.Repeat(1.0 / PerFt, trailing.Length - 1)).Select(ft => ft * Units.FtM));
    }

    private static double Largest(InfluenceLine line, AxleTrain train) =>
        SweepExtremes.Of(line, train, Sense.Max, TravelDirections.Both, WeighingRule.None).Value;

    private static double MomentKipFt(double spanM, double sectionM, AxleTrain train) => Largest(new KingPost(spanM, sectionM).Moment, train) / Units.KipFtKnm;

    private static double ShearKip(double spanM, AxleTrain train) => Largest(new KingPost(spanM, spanM / 2).EndReaction, train) / Units.KipKn;

    private static double PierKip(double spanM, AxleTrain train) => Largest(new KingPost(2 * spanM, spanM).PierReaction, train) / Units.KipKn;

    /// <summary>Standard Specifications: 0.64 kip/ft with 18 kip for moment.</summary>
    private static double LaneMomentKipFt(double spanM)
    {
        var line = new KingPost(spanM, spanM / 2).Moment;
        return ((0.64 * line.PositiveArea / Units.FtM) + (18 * line.MaxAbs)) / Units.FtM;
    }

    /// <summary>Standard Specifications: 0.64 kip/ft with 26 kip for shear.</summary>
    private static double LaneShearKip(double spanM)
    {
        var line = new KingPost(spanM, spanM / 2).EndReaction;
        return (0.64 * line.PositiveArea / Units.FtM) + (26 * line.MaxAbs);
    }

    /// <summary>Largest over sections of the middle part: a net of sections, then the best of them refined.</summary>
    private static double AbsoluteMomentKipFt(double spanM, AxleTrain train)
    {
        var (centre, width) = (spanM / 2, 0.4 * spanM);
        var best = 0.0;
        for (var round = 0; round < 4; round++)
        {
            var (bestAt, step) = (centre, width / 20);
            for (var i = -20; i <= 20; i++)
            {
                var moment = MomentKipFt(spanM, centre + (i * step), train);
                (best, bestAt) = moment > best ? (moment, centre + (i * step)) : (best, bestAt);
            }

            (centre, width) = (bestAt, 2 * step);
        }

        return best;
    }

    private static double Off(ReferenceTable.Row row, string column, double found, double digits, double relative = 1e-6)
    {
        var off = Math.Abs(found - row.Number(column));
        Assert.True(off <= digits + (relative * Math.Abs(found)), $"{column}: expected {row.Number(column):R}, found {found:R}");
        return off;
    }
}
