using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Trusses;

public class MechanismTests
{
    private static TrussSketch Pratt() => (ChordTruss.Of([6, 6, 6, 6], [7, 7, 7, 7, 7], ChordTruss.Pratt(4)) with { EndPosts = true }).Sketch();

    /// <summary>Without its diagonal the second panel is a parallelogram: the joints on one side of it sink against those on the other.</summary>
    [Fact]
    public void A_panel_without_diagonal_is_refused_and_its_joints_are_named()
    {
        var fault = Refused(Pratt().Without("U1L2"));
        Assert.StartsWith("the truss is a mechanism: joints ", fault.Message, StringComparison.Ordinal);
        foreach (var joint in (string[])["L1", "U1", "L2", "U2"])
        {
            Assert.Contains(joint, fault.Message, StringComparison.Ordinal);
        }
    }

    /// <summary>A joint on two bars in one line moves across them, and nothing else moves.</summary>
    [Fact]
    public void A_joint_on_two_bars_in_line_is_named_alone()
    {
        var sketch = Pratt().Without("U2L2").Without("U1U2").Without("U2U3").Joint("M", 12, 3.5).Bar("L2", "M").Bar("M", "U2");
        sketch.Bar("U1", "U2").Bar("U2", "U3");
        Assert.Equal("the truss is a mechanism: joint M can move", Refused(sketch).Message);
    }

    [Fact]
    public void A_truss_on_rollers_alone_can_move_as_a_whole()
    {
        var sketch = Pratt();
        sketch.Supports[0] = sketch.Supports[0] with { HoldsX = false };
        Assert.EndsWith("its supports do not hold it as a whole", Refused(sketch).Message, StringComparison.Ordinal);
    }

    /// <summary>Three bars that meet in one point, or are parallel, do not hold a body: here three vertical supports.</summary>
    [Fact]
    public void Three_parallel_supports_do_not_hold_a_truss()
    {
        var sketch = Pratt().Roller("L2");
        sketch.Supports[0] = sketch.Supports[0] with { HoldsX = false };
        Assert.Contains("do not hold it as a whole", Refused(sketch).Message, StringComparison.Ordinal);
    }

    /// <summary>A redundant truss whose forces hang on digits that doubles do not have is refused for its stiffnesses, not for its shape.</summary>
    [Fact]
    public void Stiffnesses_too_uneven_to_solve_are_named()
    {
        var crossed = ChordTruss.Of([6, 6, 6, 6], [7, 7, 7, 7, 7], [.. Enumerable.Repeat(Diagonal.Crossed, 4)]);
        var fault = Refused(crossed.Sketch(m => m % 2 == 0 ? 1e-6 : 1e6));
        Assert.Contains("the stiffness E·A/L of member '", fault.Message, StringComparison.Ordinal);
    }

    private static Fault Refused(TrussSketch sketch)
    {
        var faults = new FaultList();
        Assert.Null(TrussLines.TrySolve(sketch.Model(), faults));
        return Assert.Single(faults.All);
    }
}
