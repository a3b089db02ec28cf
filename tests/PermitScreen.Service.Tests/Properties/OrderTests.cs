using System.Collections;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Properties;

/// <summary>The order in which a file lists things means nothing.</summary>
public sealed class OrderTests
{
    /// <summary>Another numbering of joints rounds differently.</summary>
    private const double Tolerance = 1e-9;

    public static TheoryData<string> SingleTrips() => Rated.SingleTrips();

    [Theory]
    [MemberData(nameof(SingleTrips))]
    public void Lists_in_another_order_give_the_same_rating_factors(string name)
    {
        var before = Rated.Effects(Rated.Case(name).Screen());
        foreach (var seed in new[] { 11, 12 })
        {
            var random = new Random(seed);
            var after = Rated.Case(name, static _ => { }, s => Shuffle(s, random)).Screen();
            Rated.Agree(before, Rated.Effects(after), Tolerance);
        }
    }

    private static void Shuffle(Structure structure, Random random)
    {
        foreach (var unit in structure.Units)
        {
            IList[] lists = [unit.Effects, unit.Truss.Nodes, unit.Truss.Members, unit.Truss.Supports, unit.Truss.Planes];
            foreach (var list in lists.Concat(unit.Effects.Where(e => e.Rated is not null).SelectMany(e => new IList[] { e.Rated.Resistances, e.Rated.DeadLoads, e.PlaneIds })))
            {
                for (var i = list.Count - 1; i > 0; i--)
                {
                    var other = random.Next(i + 1);
                    (list[i], list[other]) = (list[other], list[i]);
                }
            }

            // Members may be given from either end.
            foreach (var member in unit.Truss.Members.Where(_ => random.Next(2) == 1))
            {
                (member.StartNode, member.EndNode) = (member.EndNode, member.StartNode);
            }
        }
    }
}
