namespace PermitScreen.Mechanics.Trusses;

/// <summary>Ordinates of all axial forces and reactions at all deck panel points, and how well joints balance under them.</summary>
internal sealed class UnitLoads
{
    private UnitLoads(TrussModel model)
    {
        var points = model.PanelNodes.Length;
        Axial = [.. model.Members.Select(_ => new double[points])];
        ReactionX = [.. model.Supports.Select(support => support.HoldsX ? new double[points] : null)];
        ReactionY = [.. model.Supports.Select(support => support.HoldsY ? new double[points] : null)];
    }

    /// <summary>Axial force of each member at each panel point.</summary>
    internal double[][] Axial { get; }

    /// <summary>Horizontal reaction of each support at each panel point; null where not held.</summary>
    internal double[]?[] ReactionX { get; }

    /// <summary>Vertical reaction of each support at each panel point; null where not held.</summary>
    internal double[]?[] ReactionY { get; }

    /// <summary>Ordinates not above this in size were set to 0.</summary>
    internal double Nothing { get; private set; }

    internal SolveQuality Quality { get; private set; }

    internal double ElasticRounding { get; private set; }

    /// <summary>The joint with the largest unbalanced force.</summary>
    internal int WorstJoint { get; private set; }

    internal static UnitLoads Solve(TrussGeometry truss, StiffnessSystem system, double nothingShare, double largestForNothing)
    {
        var all = new UnitLoads(truss.Model);
        var solver = new UnitLoadSolver(truss, system);
        var tensions = new double[truss.Stiffness.Length];
        double residual = 0, correction = 0;
        for (var p = 0; p < truss.Model.PanelNodes.Length; p++)
        {
            solver.Solve(truss.Model.PanelNodes[p], tensions);
            residual = Worse(residual, solver.Residual);
            correction = Worse(correction, solver.Correction);
            all.ElasticRounding = Worse(all.ElasticRounding, solver.ElasticRounding);
            all.Keep(truss, p, tensions);
        }

        all.DropNothing(nothingShare, largestForNothing);
        var error = 0.0;
        for (var p = 0; p < truss.Model.PanelNodes.Length; p++)
        {
            var (joint, unbalanced) = all.LeastBalanced(truss, p);
            all.WorstJoint = unbalanced > error || double.IsNaN(unbalanced) ? joint : all.WorstJoint;
            error = Worse(error, unbalanced);
        }

        all.Quality = new SolveQuality(residual, error, correction);
        return all;
    }

    /// <summary>The larger; NaN, which Math.Max keeps, is never lost.</summary>
    private static double Worse(double a, double b) => Math.Max(a, b);

    private void Keep(TrussGeometry truss, int p, double[] tensions)
    {
        for (var m = 0; m < tensions.Length; m++)
        {
            Axial[m][p] = tensions[m];
        }

        var forces = ForcesWithoutReactions(truss, p, tensions);
        for (var s = 0; s < ReactionX.Length; s++)
        {
            var joint = truss.Model.SupportNodes[s];
            if (ReactionX[s] is { } x)
            {
                x[p] = -forces[2 * joint];
            }

            if (ReactionY[s] is { } y)
            {
                y[p] = -forces[(2 * joint) + 1];
            }
        }
    }

    private void DropNothing(double nothingShare, double largestForNothing)
    {
        var rows = Axial.Concat(ReactionX.OfType<double[]>()).Concat(ReactionY.OfType<double[]>()).ToArray();
        var largest = rows.Max(row => row.Max(Math.Abs));
        Nothing = nothingShare * Math.Min(largest, largestForNothing);
        foreach (var row in rows)
        {
            for (var p = 0; p < row.Length; p++)
            {
                row[p] = Math.Abs(row[p]) <= Nothing ? 0 : row[p];
            }
        }
    }

    private (int Joint, double Unbalanced) LeastBalanced(TrussGeometry truss, int p)
    {
        var forces = ForcesWithoutReactions(truss, p, [.. Axial.Select(row => row[p])]);
        for (var s = 0; s < ReactionX.Length; s++)
        {
            var joint = truss.Model.SupportNodes[s];
            forces[2 * joint] += ReactionX[s]?[p] ?? 0;
            forces[(2 * joint) + 1] += ReactionY[s]?[p] ?? 0;
        }

        var (worst, largest) = (0, 0.0);
        for (var d = 0; d < forces.Length; d++)
        {
            if (double.IsNaN(forces[d]))
            {
                return (d / 2, double.NaN);
            }

            if (Math.Abs(forces[d]) > largest)
            {
                (worst, largest) = (d / 2, Math.Abs(forces[d]));
            }
        }

        return (worst, largest);
    }

    private static double[] ForcesWithoutReactions(TrussGeometry truss, int p, double[] tensions)
    {
        var forces = new double[truss.Held.Length];
        forces[(2 * truss.Model.PanelNodes[p]) + 1] = -1;
        truss.AddMemberForces(tensions, forces);
        return forces;
    }
}
