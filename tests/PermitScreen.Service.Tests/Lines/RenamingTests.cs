using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Tests.Support;
using InfluenceLine = PermitScreen.Mechanics.Lines.InfluenceLine;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>Names live in the revision alone: other names and another order compute nothing, and the lines stand under the names of now.</summary>
public sealed class RenamingTests
{
    private readonly LineLibrary _library = new();

    public static TheoryData<string> Structures() => [.. ContractFiles.Structures("deploy", "demo", "catalogue").Select(s => s.Name)];

    [Theory]
    [MemberData(nameof(Structures))]
    public void Joints_named_anew_compute_nothing(string name) => AssertNothingComputed(name, unit =>
    {
        foreach (var node in unit.Truss.Nodes)
        {
            node.Name = New(node.Name);
        }

        foreach (var member in unit.Truss.Members)
        {
            (member.StartNode, member.EndNode) = (New(member.StartNode), New(member.EndNode));
        }

        foreach (var support in unit.Truss.Supports)
        {
            support.Node = New(support.Node);
        }

        Rename(unit.Truss.Deck.PanelPoints);
        Rename(unit.Truss.Deck.JointsWithoutFloorBeam);
    });

    [Theory]
    [MemberData(nameof(Structures))]
    public void Members_and_supports_named_anew_compute_nothing_and_show_their_names(string name)
    {
        var (before, after) = AssertNothingComputed(name, unit =>
        {
            foreach (var member in unit.Truss.Members)
            {
                member.Name = New(member.Name);
            }

            foreach (var support in unit.Truss.Supports)
            {
                support.Name = New(support.Name);
            }

            foreach (var effect in unit.Effects)
            {
                if (effect.QuantityCase == Effect.QuantityOneofCase.AxialMember)
                {
                    effect.AxialMember = New(effect.AxialMember);
                }
                else
                {
                    effect.Reaction.Support = New(effect.Reaction.Support);
                }
            }
        });
        Assert.All(before.Lines.Zip(after.Lines), pair => Assert.Equal(New(pair.First.Description), pair.Second.Description));
        Assert.All(after.Rated!.Units.SelectMany(u => u.Effects), e => Assert.EndsWith(" anew", e.Description, StringComparison.Ordinal));
    }

    [Theory]
    [MemberData(nameof(Structures))]
    public void Another_order_computes_nothing_and_gives_the_same_lines(string name)
    {
        var random = new Random(20260911);
        AssertNothingComputed(name, unit =>
        {
            Shuffle(unit.Truss.Nodes, random);
            Shuffle(unit.Truss.Members, random);
            Shuffle(unit.Truss.Supports, random);
            foreach (var member in unit.Truss.Members.Where(_ => random.Next(2) == 0))
            {
                (member.StartNode, member.EndNode) = (member.EndNode, member.StartNode);
            }
        });
    }

    private static string New(string name) => name + " anew";

    private static void Rename(Google.Protobuf.Collections.RepeatedField<string> names)
    {
        for (var i = 0; i < names.Count; i++)
        {
            names[i] = New(names[i]);
        }
    }

    private static void Shuffle<T>(IList<T> list, Random random)
    {
        var items = list.ToArray();
        random.Shuffle(items);
        for (var i = 0; i < items.Length; i++)
        {
            list[i] = items[i];
        }
    }

    private (PreparedStructure Before, PreparedStructure After) AssertNothingComputed(string name, Action<Unit> change)
    {
        var structure = ContractFiles.Structures("deploy", "demo", "catalogue").Single(s => s.Name == name);
        var before = Prepared(structure);
        var solved = _library.Counts.Solved;
        var changed = structure.Clone();
        foreach (var unit in changed.Units)
        {
            change(unit);
        }

        Assert.NotEqual(structure, changed);
        var after = Prepared(changed);
        Assert.True(solved > 0);
        Assert.Equal(solved, _library.Counts.Solved);
        Assert.Equal(before.Lines.Select(l => (l.UnitId, l.EffectId)), after.Lines.Select(l => (l.UnitId, l.EffectId)));
        Assert.All(before.Lines.Zip(after.Lines), pair => AssertSame(pair.First.Line, pair.Second.Line));
        return (before, after);
    }

    private PreparedStructure Prepared(Structure structure)
    {
        var faults = new FaultList();
        var prepared = StructureMapper.Map(structure, faults) is { } record ? StructurePreparation.Prepare(record, _library, faults) : null;
        Assert.True(prepared is not null, string.Join(' ', faults.All));
        return prepared;
    }

    private static void AssertSame(InfluenceLine one, InfluenceLine other)
    {
        Assert.True(one.XM.SequenceEqual(other.XM));
        Assert.True(one.LeftOrdinates.SequenceEqual(other.LeftOrdinates));
        Assert.True(one.RightOrdinates.SequenceEqual(other.RightOrdinates));
    }
}
