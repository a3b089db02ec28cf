using System.Collections.Immutable;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>The order of a truss's parts that does not depend on how they are listed, and the ways there and back.</summary>
internal sealed class CanonicalOrder
{
    public CanonicalOrder(TrussModel model)
    {
        // No two joints stand at one place, no two members join the same joints, no direction of a joint is held twice: there are no ties.
        Joints = [.. Enumerable.Range(0, model.Nodes.Length).OrderBy(i => model.Nodes[i].XM).ThenBy(i => model.Nodes[i].YM)];
        var place = Inverse(Joints);
        var byName = new Dictionary<string, int>(model.Nodes.Length, StringComparer.Ordinal);
        for (var i = 0; i < model.Nodes.Length; i++)
        {
            byName.Add(model.Nodes[i].Name, place[i]);
        }

        LowEnd = [.. model.Members.Select(m => Math.Min(byName[m.StartNode], byName[m.EndNode]))];
        HighEnd = [.. model.Members.Select(m => Math.Max(byName[m.StartNode], byName[m.EndNode]))];
        Members = [.. Enumerable.Range(0, model.Members.Length)
            .OrderBy(m => LowEnd[m]).ThenBy(m => HighEnd[m]).ThenBy(m => model.Members[m].AxialStiffnessKn)];
        Held = [.. model.Supports.Select(s => byName[s.Node])];
        Supports = [.. Enumerable.Range(0, model.Supports.Length)
            .OrderBy(s => Held[s]).ThenByDescending(s => model.Supports[s].HoldsX).ThenByDescending(s => model.Supports[s].HoldsY)];
        Deck = [.. model.DeckPanelPoints.Select(name => byName[name])];
        PlaceOfMember = Inverse(Members);
        PlaceOfSupport = Inverse(Supports);
    }

    /// <summary>Original index of each joint in canonical order.</summary>
    public ImmutableArray<int> Joints { get; }

    /// <summary>Original index of each member in canonical order.</summary>
    public ImmutableArray<int> Members { get; }

    /// <summary>Original index of each support in canonical order.</summary>
    public ImmutableArray<int> Supports { get; }

    /// <summary>Canonical index of the first joint of each member as given.</summary>
    public ImmutableArray<int> LowEnd { get; }

    /// <summary>Canonical index of the second joint of each member as given.</summary>
    public ImmutableArray<int> HighEnd { get; }

    /// <summary>Canonical index of the joint that each support as given holds.</summary>
    public ImmutableArray<int> Held { get; }

    /// <summary>Canonical index of each deck panel point, by chainage.</summary>
    public ImmutableArray<int> Deck { get; }

    /// <summary>Canonical index of each member as given.</summary>
    public ImmutableArray<int> PlaceOfMember { get; }

    /// <summary>Canonical index of each support as given.</summary>
    public ImmutableArray<int> PlaceOfSupport { get; }

    private static ImmutableArray<int> Inverse(ImmutableArray<int> order)
    {
        var inverse = new int[order.Length];
        for (var i = 0; i < order.Length; i++)
        {
            inverse[order[i]] = i;
        }

        return [.. inverse];
    }
}
