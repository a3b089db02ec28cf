using System.Globalization;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>The same truss written down in another way: other order of joints, members and supports, other ends first, other names.</summary>
internal sealed class Shuffled
{
    private Shuffled(TrussModel model, int[] memberFrom, int[] supportFrom) => (Model, MemberFrom, SupportFrom) = (model, memberFrom, supportFrom);

    internal TrussModel Model { get; }

    /// <summary>For each member, its index in the truss that it was made of.</summary>
    internal int[] MemberFrom { get; }

    internal int[] SupportFrom { get; }

    internal static TrussModel Random(Random random) => RandomTruss.Solved(random).Model;

    internal static Shuffled Of(TrussModel model, Random random)
    {
        var joints = Order(model.Nodes.Length, random);
        var members = Order(model.Members.Length, random);
        var supports = Order(model.Supports.Length, random);
        var names = model.Nodes.Select((n, i) => (n.Name, New: string.Create(CultureInfo.InvariantCulture, $"joint {random.Next()} {i}")))
            .ToDictionary(p => p.Name, p => p.New, StringComparer.Ordinal);
        var faults = new FaultList();
        var other = TrussModel.TryCreate(
            [.. joints.Select(j => new TrussNode(names[model.Nodes[j].Name], Signed(model.Nodes[j].XM), Signed(model.Nodes[j].YM)))],
            [.. members.Select(m => Turned(model.Members[m], m))],
            [.. supports.Select(s => model.Supports[s] with { Name = $"bearing {s} {random.Next()}", Node = names[model.Supports[s].Node] })],
            [.. model.DeckPanelPoints.Select(p => names[p])],
            model.Start,
            model.End,
            faults);
        Assert.True(other is not null, string.Join("; ", faults.All));
        return new Shuffled(other, members, supports);

        TrussMember Turned(TrussMember member, int m)
        {
            var (start, end) = random.Next(2) == 0 ? (member.StartNode, member.EndNode) : (member.EndNode, member.StartNode);
            return new TrussMember($"bar {m} {random.Next()}", names[start], names[end], member.AxialStiffnessKn);
        }

        double Signed(double x) => x == 0 && random.Next(2) == 0 ? -0.0 : x;
    }

    private static int[] Order(int count, Random random)
    {
        var order = Enumerable.Range(0, count).ToArray();
        random.Shuffle(order);
        return order;
    }
}
