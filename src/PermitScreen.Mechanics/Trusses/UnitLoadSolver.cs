namespace PermitScreen.Mechanics.Trusses;

/// <summary>Member forces and reactions of a truss under a unit load at one joint, with iterative refinement.</summary>
/// <remarks>
/// The member forces are kept and corrected beside the displacements: each refinement solves for what the joints still lack by the forces
/// themselves. So equilibrium holds to rounding of the forces, not of the (much larger) products of stiffness and displacement, and the forces
/// of a determinate truss are as exact as statics gives them.
/// </remarks>
internal sealed class UnitLoadSolver(TrussGeometry truss, StiffnessSystem system)
{
    private const int MostRefinements = 8;

    /// <summary>Unbalanced force, per unit load, below which refining ends.</summary>
    private const double GoodEnough = 2e-16;

    /// <summary>Spacing of doubles at 1, 2⁻⁵².</summary>
    private const double Rounding = 2.220446049250313e-16;

    private readonly double[] _load = new double[truss.Held.Length];
    private readonly double[] _unbalanced = new double[truss.Held.Length];
    private readonly double[] _step = new double[truss.Held.Length];
    private readonly double[] _displacements = new double[truss.Held.Length];
    private readonly double[] _elastic = new double[truss.Stiffness.Length];
    private readonly double[] _change = new double[truss.Stiffness.Length];

    /// <summary>Residual of K·u = f over ‖K‖·‖u‖ + ‖f‖ of the last load.</summary>
    internal double Residual { get; private set; }

    /// <summary>Largest change of a member force by the last refinement, over the larger of 1 and the largest force.</summary>
    internal double Correction { get; private set; }

    /// <summary>Bound of the rounding in member forces taken from displacements, over the larger of 1 and the largest force; what a redundant truss' forces rest on.</summary>
    internal double ElasticRounding { get; private set; }

    /// <summary>Solves for 1 kN downwards on a joint.</summary>
    /// <param name="joint">Index of the joint.</param>
    /// <param name="tensions">Filled with the axial force of each member, kN.</param>
    internal void Solve(int joint, Span<double> tensions)
    {
        Array.Clear(_load);
        Array.Clear(_displacements);
        Array.Clear(_change);
        tensions.Clear();
        _load[(2 * joint) + 1] = -1;
        var lack = double.PositiveInfinity;
        for (var round = 0; round <= MostRefinements; round++)
        {
            var now = Unbalanced(tensions);
            if (now <= GoodEnough)
            {
                // Nothing left to correct: what the last solve changed says nothing about what is still wrong.
                Array.Clear(_change);
                break;
            }

            if (round > 2 && !(now < lack / 2))
            {
                break;
            }

            lack = now;
            Refine(tensions);
        }

        Judge(tensions);
    }

    private double Unbalanced(ReadOnlySpan<double> tensions)
    {
        _load.CopyTo(_unbalanced, 0);
        truss.AddMemberForces(tensions, _unbalanced);
        var largest = 0.0;
        for (var d = 0; d < _unbalanced.Length; d++)
        {
            if (!truss.Held[d])
            {
                largest = Math.Max(largest, Math.Abs(_unbalanced[d]));
            }
        }

        return largest;
    }

    private void Refine(Span<double> tensions)
    {
        system.Solve(_unbalanced, _step);
        for (var d = 0; d < _step.Length; d++)
        {
            _displacements[d] += _step[d];
        }

        for (var m = 0; m < tensions.Length; m++)
        {
            _change[m] = truss.TensionOf(m, _step);
            tensions[m] += _change[m];
        }
    }

    private void Judge(ReadOnlySpan<double> tensions)
    {
        double largestTension = 1, largestChange = 0, largestDisplacement = 0, rounding = 0;
        for (var m = 0; m < tensions.Length; m++)
        {
            largestTension = Math.Max(largestTension, Math.Abs(tensions[m]));
            largestChange = Math.Max(largestChange, Math.Abs(_change[m]));
            _elastic[m] = truss.TensionOf(m, _displacements);
        }

        for (var d = 0; d < _displacements.Length; d++)
        {
            largestDisplacement = Math.Max(largestDisplacement, Math.Abs(_displacements[d]));
        }

        for (var m = 0; m < tensions.Length; m++)
        {
            var (start, end) = (2 * truss.Model.StartNodes[m], 2 * truss.Model.EndNodes[m]);
            var moved = Math.Max(
                Math.Max(Math.Abs(_displacements[start]), Math.Abs(_displacements[start + 1])),
                Math.Max(Math.Abs(_displacements[end]), Math.Abs(_displacements[end + 1])));
            rounding = Math.Max(rounding, Rounding * truss.Stiffness[m] * moved);
        }

        Correction = largestChange / largestTension;
        ElasticRounding = rounding / largestTension;
        Residual = Unbalanced(_elastic) / ((system.Norm * largestDisplacement) + 1);
    }
}
