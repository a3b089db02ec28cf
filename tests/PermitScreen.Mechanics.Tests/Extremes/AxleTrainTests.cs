using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Tests.Extremes;

public class AxleTrainTests
{
    [Fact]
    public void Every_fault_is_reported_with_its_field()
    {
        var faults = new FaultList();
        Assert.Null(AxleTrain.TryCreate([100, double.NaN, 0, -5], [0.5, 3, 2, double.PositiveInfinity], faults));
        Assert.Equal(
            ["axles[1].load_kn", "axles[2].load_kn", "axles[3].load_kn", "axles[0].offset_m", "axles[2].offset_m", "axles[3].offset_m"],
            faults.All.Select(fault => fault.Path));
    }

    [Fact]
    public void A_vehicle_without_axles_is_refused()
    {
        var faults = new FaultList();
        Assert.Null(AxleTrain.TryCreate([], [], faults));
        Assert.Equal("axles", Assert.Single(faults.All).Path);
    }

    [Fact]
    public void Gross_weight_and_length_follow_from_the_axles()
    {
        var train = AxleTrain.TryCreate([60, 100, 100], [0, 4, 5.5], new FaultList())!;
        Assert.Equal(260, train.GrossKn);
        Assert.Equal(5.5, train.LengthM);
        Assert.Equal([30, 50, 50], train.ScaledBy(0.5).LoadsKn.ToArray());
    }
}
