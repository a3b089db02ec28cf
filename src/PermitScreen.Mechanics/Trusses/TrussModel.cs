using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>A plane pin-jointed truss with its supports and the path of its deck, checked for everything that needs no solution.</summary>
/// <remarks>Coordinates in m, x along the structure and y upwards; stiffness E·A in kN. Immutable. Whether it stands is found by <see cref="TrussLines.TrySolve"/>.</remarks>
public sealed class TrussModel
{
    private readonly int[] _startNodes;
    private readonly int[] _endNodes;
    private readonly int[] _supportNodes;
    private readonly int[] _panelNodes;

    private TrussModel(
        ImmutableArray<TrussNode> nodes,
        ImmutableArray<TrussMember> members,
        ImmutableArray<TrussSupport> supports,
        ImmutableArray<string> deckPanelPoints,
        DeckEnd start,
        DeckEnd end)
    {
        (Nodes, Members, Supports, DeckPanelPoints, Start, End) = (nodes, members, supports, deckPanelPoints, start, end);
        var index = new Dictionary<string, int>(nodes.Length, StringComparer.Ordinal);
        for (var i = 0; i < nodes.Length; i++)
        {
            index[nodes[i].Name] = i;
        }

        _startNodes = [.. members.Select(member => index[member.StartNode])];
        _endNodes = [.. members.Select(member => index[member.EndNode])];
        _supportNodes = [.. supports.Select(support => index[support.Node])];
        _panelNodes = [.. deckPanelPoints.Select(name => index[name])];
        var (firstM, lastM) = (nodes[_panelNodes[0]].XM, nodes[_panelNodes[^1]].XM);
        DeckStartM = start.Kind == DeckEndKind.EndFloorBeam ? firstM : start.TipM;
        DeckEndM = end.Kind == DeckEndKind.EndFloorBeam ? lastM : end.TipM;
    }

    /// <summary>Joints, in the order given.</summary>
    public ImmutableArray<TrussNode> Nodes { get; }

    /// <summary>Members, in the order given.</summary>
    public ImmutableArray<TrussMember> Members { get; }

    /// <summary>Supports, in the order given.</summary>
    public ImmutableArray<TrussSupport> Supports { get; }

    /// <summary>Names of the joints that carry floor beams, by increasing chainage; two or more.</summary>
    public ImmutableArray<string> DeckPanelPoints { get; }

    /// <summary>How the deck ends at the lower chainage.</summary>
    public DeckEnd Start { get; }

    /// <summary>How the deck ends at the higher chainage.</summary>
    public DeckEnd End { get; }

    /// <summary>Where the deck starts, m: the first panel point, the seat or the tip of the overhang.</summary>
    public double DeckStartM { get; }

    /// <summary>Where the deck ends, m: the last panel point, the seat or the tip of the overhang.</summary>
    public double DeckEndM { get; }

    /// <summary>Index of each member's start joint.</summary>
    internal ReadOnlySpan<int> StartNodes => _startNodes;

    /// <summary>Index of each member's end joint.</summary>
    internal ReadOnlySpan<int> EndNodes => _endNodes;

    /// <summary>Index of the joint that each support holds.</summary>
    internal ReadOnlySpan<int> SupportNodes => _supportNodes;

    /// <summary>Index of each deck panel point's joint.</summary>
    internal ReadOnlySpan<int> PanelNodes => _panelNodes;

    /// <summary>Checks a truss and makes a model of it.</summary>
    /// <param name="nodes">Joints: names unique, coordinates finite and within ±10⁶ m, no two at one place.</param>
    /// <param name="members">Members: names unique, joints known and apart, stiffness finite and &gt; 0, no two between the same joints; all joints connected.</param>
    /// <param name="supports">Supports: names unique, joint known, at least one direction held, no direction of a joint held twice.</param>
    /// <param name="deckPanelPoints">Joints that carry floor beams; two or more, chainage increasing.</param>
    /// <param name="start">How the deck ends at the lower chainage.</param>
    /// <param name="end">How the deck ends at the higher chainage.</param>
    /// <param name="faults">Every fault found is added, under paths such as <c>nodes[3].x_m</c>; none is thrown.</param>
    /// <returns>The model, or <see langword="null"/> if a fault was added.</returns>
    public static TrussModel? TryCreate(
        IReadOnlyList<TrussNode> nodes,
        IReadOnlyList<TrussMember> members,
        IReadOnlyList<TrussSupport> supports,
        IReadOnlyList<string> deckPanelPoints,
        DeckEnd start,
        DeckEnd end,
        FaultList faults)
    {
        var before = faults.Count;
        var joints = JointChecks.Run(nodes, faults);
        MemberChecks.Run(joints, members, faults);
        SupportChecks.Run(joints, supports, faults);
        DeckChecks.Run(joints, deckPanelPoints, start, end, faults);
        return faults.Count > before
            ? null
            : new TrussModel([.. nodes], [.. members], [.. supports], [.. deckPanelPoints], start, end);
    }
}
