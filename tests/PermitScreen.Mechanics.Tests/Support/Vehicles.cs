using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>The vehicles of tests/reference.</summary>
internal static class Vehicles
{
    /// <summary>A vehicle of vehicles_us.csv (kip and ft, converted exactly) or vehicles_en1991_annexA.csv.</summary>
    internal static AxleTrain Named(string name)
    {
        var us = ReferenceTable.Read("vehicles_us.csv").Rows.SingleOrDefault(row => row.Text("vehicle") == name);
        if (us is not null)
        {
            return Of(us.Numbers("axle_loads_kip").Select(kip => kip * Units.KipKn), us.Numbers("spacings_ft").Select(ft => ft * Units.FtM));
        }

        var en = ReferenceTable.Read("vehicles_en1991_annexA.csv").Rows.Single(row => "EN 1991-2 " + row.Text("class") == name);
        return Of(en.Numbers("axle_line_loads_kn"), en.Numbers("spacings_m"));
    }

    internal static AxleTrain Of(IEnumerable<double> loadsKn, IEnumerable<double> spacingsM)
    {
        var offsetsM = new List<double> { 0 };
        foreach (var spacing in spacingsM)
        {
            offsetsM.Add(offsetsM[^1] + spacing);
        }

        var faults = new FaultList();
        var train = AxleTrain.TryCreate([.. loadsKn], [.. offsetsM], faults);
        Assert.True(train is not null, string.Join("; ", faults.All));
        return train;
    }
}
