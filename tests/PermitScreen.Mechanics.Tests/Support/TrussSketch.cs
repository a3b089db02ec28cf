using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>A truss being drawn for a test: lists that may be changed before it becomes a model.</summary>
internal sealed class TrussSketch
{
    internal List<TrussNode> Nodes { get; } = [];

    internal List<TrussMember> Members { get; } = [];

    internal List<TrussSupport> Supports { get; } = [];

    internal List<string> PanelPoints { get; } = [];

    internal DeckEnd Start { get; set; } = new(DeckEndKind.EndFloorBeam, 0);

    internal DeckEnd End { get; set; } = new(DeckEndKind.EndFloorBeam, 0);

    internal TrussSketch Joint(string name, double xM, double yM)
    {
        Nodes.Add(new TrussNode(name, xM, yM));
        return this;
    }

    internal TrussSketch Bar(string start, string end, double axialStiffnessKn = 2e6)
    {
        Members.Add(new TrussMember(start + end, start, end, axialStiffnessKn));
        return this;
    }

    internal TrussSketch Pin(string joint)
    {
        Supports.Add(new TrussSupport("at " + joint, joint, true, true));
        return this;
    }

    internal TrussSketch Roller(string joint)
    {
        Supports.Add(new TrussSupport("at " + joint, joint, false, true));
        return this;
    }

    internal TrussSketch Deck(params string[] panelPoints)
    {
        PanelPoints.AddRange(panelPoints);
        return this;
    }

    internal TrussSketch Without(string member)
    {
        Assert.Equal(1, Members.RemoveAll(m => m.Name == member));
        return this;
    }

    internal TrussModel? TryModel(FaultList faults) => TrussModel.TryCreate(Nodes, Members, Supports, PanelPoints, Start, End, faults);

    internal TrussModel Model()
    {
        var faults = new FaultList();
        var model = TryModel(faults);
        Assert.True(model is not null, string.Join("; ", faults.All));
        return model;
    }

    internal (TrussModel Model, TrussLines Lines) Solve()
    {
        var model = Model();
        var faults = new FaultList();
        var lines = TrussLines.TrySolve(model, faults);
        Assert.True(lines is not null, string.Join("; ", faults.All));
        return (model, lines);
    }
}
