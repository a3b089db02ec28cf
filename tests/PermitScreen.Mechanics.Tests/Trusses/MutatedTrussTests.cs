using System.Collections.Concurrent;
using System.Text.RegularExpressions;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Tests.Support;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Trusses;

/// <summary>Ten thousand trusses that were sound before something was done to them: each is refused by name or solved to the accuracy promised.</summary>
public partial class MutatedTrussTests
{
    private const int Trusses = 10_000;

    private const double Promised = 1e-9;

    [Fact]
    public void A_mutated_truss_is_refused_by_name_or_solved_accurately()
    {
        var outcomes = new ConcurrentDictionary<string, int>(StringComparer.Ordinal);
        var balance = new ConcurrentBag<double>();
        var residual = new ConcurrentBag<double>();
        Parallel.For(0, Trusses, new ParallelOptions { MaxDegreeOfParallelism = Environment.ProcessorCount }, number =>
        {
            var random = new Random(7_919 * (number + 1));
            var sketch = RandomTruss.Sketch(random);
            var mutation = Mutate(random, sketch);
            var faults = new FaultList();
            var model = sketch.TryModel(faults);
            if (model is null)
            {
                Assert.NotEmpty(faults.All);
                Assert.All(faults.All, fault => Assert.True(fault.Path.Length > 0 && fault.Message.Contains('\'', StringComparison.Ordinal), $"truss {number}: {fault}"));
                outcomes.AddOrUpdate("refused at the door", 1, (_, count) => count + 1);
                return;
            }

            var lines = TrussLines.TrySolve(model, faults);
            if (lines is null)
            {
                var fault = Assert.Single(faults.All);
                Assert.True(NamesAJoint().IsMatch(fault.Message), $"truss {number} ({mutation}): {fault}");
                outcomes.AddOrUpdate(fault.Message.Contains("is a mechanism", StringComparison.Ordinal) ? "mechanism" : "nearly a mechanism", 1, (_, count) => count + 1);
                return;
            }

            Assert.Empty(faults.All);
            var worst = JointBalance.Worst(model, lines);
            Assert.True(worst <= Promised, $"truss {number} ({mutation}): joints balance to {worst:E2} only");
            Assert.True(lines.Quality.LargestResidual <= Promised && lines.Quality.LargestEquilibriumError <= Promised, $"truss {number} ({mutation}): {lines.Quality}");
            balance.Add(worst);
            residual.Add(lines.Quality.LargestResidual);
            outcomes.AddOrUpdate("solved", 1, (_, count) => count + 1);
        });

        Assert.Equal(Trusses, outcomes.Values.Sum());
        foreach (var (outcome, count) in outcomes)
        {
            Figures.Note($"mechanics.mutated[{outcome}]", count);
        }

        Figures.Note("mechanics.mutated.worst_equilibrium", balance.Max());
        Figures.Note("mechanics.mutated.worst_residual", residual.Max());
    }

    private static string Mutate(Random random, TrussSketch sketch)
    {
        var spanM = sketch.Nodes.Max(node => node.XM) - sketch.Nodes.Min(node => node.XM);
        switch (random.Next(6))
        {
            case 0:
                sketch.Members.RemoveAt(random.Next(sketch.Members.Count));
                return "bar dropped";
            case 1:
                sketch.Members.RemoveAt(random.Next(sketch.Members.Count));
                sketch.Members.RemoveAt(random.Next(sketch.Members.Count));
                return "two bars dropped";
            case 2:
                Move(random.Next(sketch.Nodes.Count));
                return "joint moved";
            case 3:
                Flatten();
                return "joint moved to (almost) the line between two others";
            case 4:
                sketch.Supports[random.Next(sketch.Supports.Count)] = sketch.Supports[0] with { Name = "moved", Node = AnyJoint() };
                return "support moved";
            default:
                sketch.Supports[^1] = sketch.Supports[^1] with { Node = sketch.Supports[0].Node };
                sketch.Supports.Add(new TrussSupport("more", AnyJoint(), random.Next(2) == 0, true));
                return "supports shared";
        }

        string AnyJoint() => sketch.Nodes[random.Next(sketch.Nodes.Count)].Name;

        double Little() => spanM * Math.Pow(10, -9 + (6 * random.NextDouble())) * (random.Next(2) == 0 ? 1 : -1);

        void Move(int i) => sketch.Nodes[i] = sketch.Nodes[i] with { XM = sketch.Nodes[i].XM + Little(), YM = sketch.Nodes[i].YM + Little() };

        // The bars of the joint become nearly parallel: the hardest case short of a mechanism.
        void Flatten()
        {
            var joint = sketch.Nodes[random.Next(sketch.Nodes.Count)];
            var others = sketch.Members.Where(m => m.StartNode == joint.Name || m.EndNode == joint.Name)
                .Select(m => m.StartNode == joint.Name ? m.EndNode : m.StartNode).Select(name => sketch.Nodes.Single(node => node.Name == name)).ToArray();
            var (a, b) = (others[0], others[^1]);
            sketch.Nodes[sketch.Nodes.IndexOf(joint)] = joint with { XM = ((a.XM + b.XM) / 2) + Little(), YM = ((a.YM + b.YM) / 2) + Little() };
        }
    }

    [GeneratedRegex(@"joints? '?[LU]\d+", RegexOptions.NonBacktracking)]
    private static partial Regex NamesAJoint();
}
