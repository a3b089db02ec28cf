namespace PermitScreen.Mechanics.Trusses;

/// <summary>The factored stiffness equations of a truss over the free directions of its joints.</summary>
internal sealed class StiffnessSystem
{
    /// <summary>Pivots of the matrix with unit diagonal at or below this mean a mechanism, or too nearly one to be solved in double precision:
    /// rounding disturbs a pivot by about 1e-14.</summary>
    internal const double PivotFloor = 1e-12;

    private readonly int[] _equations;
    private readonly double[] _scale;
    private readonly double[] _work;
    private readonly SkylineLdlt _matrix;

    private StiffnessSystem(int[] equations, double[] scale, SkylineLdlt matrix)
    {
        (_equations, _scale, _matrix) = (equations, scale, matrix);
        _work = new double[matrix.Size];
    }

    /// <summary>Largest sum of absolute entries of a row of the unscaled matrix.</summary>
    internal double Norm { get; private init; }

    /// <summary>Assembles and factors; <see langword="null"/> where the truss is (nearly) a mechanism.</summary>
    internal static StiffnessSystem? TryFactor(TrussGeometry truss)
    {
        var equations = Number(truss, out var count);
        var matrix = new SkylineLdlt(Skyline(truss, equations, count));
        var rowSums = new double[count];
        for (var m = 0; m < truss.Stiffness.Length; m++)
        {
            Assemble(truss, m, equations, matrix, rowSums);
        }

        var scale = new double[count];
        for (var j = 0; j < count; j++)
        {
            var diagonal = matrix[j, j];
            if (!(diagonal > 0))
            {
                return null;
            }

            scale[j] = 1 / Math.Sqrt(diagonal);
        }

        matrix.Scale(scale);
        return matrix.Factor(PivotFloor) ? new StiffnessSystem(equations, scale, matrix) { Norm = rowSums.DefaultIfEmpty().Max() } : null;
    }

    /// <summary>Displacements under given forces.</summary>
    /// <param name="forces">Force on each joint direction; length 2 × joints; those on held directions are ignored.</param>
    /// <param name="displacements">Filled with the displacement of each joint direction; 0 where held.</param>
    internal void Solve(ReadOnlySpan<double> forces, Span<double> displacements)
    {
        for (var d = 0; d < _equations.Length; d++)
        {
            if (_equations[d] >= 0)
            {
                _work[_equations[d]] = forces[d] * _scale[_equations[d]];
            }
        }

        _matrix.Solve(_work);
        for (var d = 0; d < _equations.Length; d++)
        {
            displacements[d] = _equations[d] >= 0 ? _work[_equations[d]] * _scale[_equations[d]] : 0;
        }
    }

    /// <summary>Equation of each joint direction, −1 where held.</summary>
    private static int[] Number(TrussGeometry truss, out int count)
    {
        var equations = new int[truss.Held.Length];
        count = 0;
        foreach (var joint in JointNumbering.ReverseCuthillMcKee(truss.Model.Nodes.Length, truss.Model.StartNodes, truss.Model.EndNodes))
        {
            equations[2 * joint] = truss.Held[2 * joint] ? -1 : count++;
            equations[(2 * joint) + 1] = truss.Held[(2 * joint) + 1] ? -1 : count++;
        }

        return equations;
    }

    private static int[] Skyline(TrussGeometry truss, int[] equations, int count)
    {
        var first = Enumerable.Range(0, count).ToArray();
        Span<int> at = stackalloc int[4];
        for (var m = 0; m < truss.Stiffness.Length; m++)
        {
            EquationsOf(truss, m, equations, at);
            foreach (var row in at)
            {
                foreach (var column in at)
                {
                    if (row >= 0 && row < column)
                    {
                        first[column] = Math.Min(first[column], row);
                    }
                }
            }
        }

        return first;
    }

    private static void Assemble(TrussGeometry truss, int m, int[] equations, SkylineLdlt matrix, double[] rowSums)
    {
        Span<int> at = stackalloc int[4];
        EquationsOf(truss, m, equations, at);
        ReadOnlySpan<double> direction = [-truss.CosX[m], -truss.CosY[m], truss.CosX[m], truss.CosY[m]];
        for (var i = 0; i < 4; i++)
        {
            for (var j = 0; j < 4; j++)
            {
                if (at[i] < 0 || at[j] < 0)
                {
                    continue;
                }

                var entry = truss.Stiffness[m] * (direction[i] * direction[j]);
                rowSums[at[i]] += Math.Abs(entry);
                if (at[i] <= at[j])
                {
                    matrix[at[i], at[j]] += entry;
                }
            }
        }
    }

    private static void EquationsOf(TrussGeometry truss, int m, int[] equations, Span<int> at)
    {
        var (start, end) = (truss.Model.StartNodes[m], truss.Model.EndNodes[m]);
        (at[0], at[1], at[2], at[3]) = (equations[2 * start], equations[(2 * start) + 1], equations[2 * end], equations[(2 * end) + 1]);
    }
}
