using System.Globalization;
using MathNet.Numerics;
using MathNet.Numerics.LinearAlgebra;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>Says which joints of a truss can move although no member changes its length.</summary>
/// <remarks>
/// The members' lengthenings are B·u, B holding direction cosines. A mechanism is a u that is not zero with B·u = 0: the null space of B, from its
/// singular value decomposition (Pellegrino and Calladine 1986, "Matrix analysis of statically and kinematically indeterminate frameworks").
/// </remarks>
internal static class MechanismFinder
{
    /// <summary>Singular values below this share of the largest are zero.</summary>
    private const double NullShare = 1e-10;

    /// <summary>Share of the largest movement below which a joint of an exact mechanism stands still.</summary>
    private const double StillExact = 1e-6;

    /// <summary>The same for the softest shape of a truss that is nearly a mechanism, where every joint moves a little.</summary>
    private const double StillNear = 0.1;

    private const int MostNamed = 12;

    /// <summary>Ratio of stiffnesses from which these, and not the shape of the truss, are told as the reason.</summary>
    private const double Uneven = 1e6;

    /// <summary>A sentence that names the joints that move, or move most.</summary>
    internal static string Describe(TrussGeometry truss)
    {
        var free = Enumerable.Range(0, truss.Held.Length).Where(d => !truss.Held[d]).ToArray();
        if (free.Length == 0)
        {
            return "the truss cannot be solved: every joint is held";
        }

        double[] values;
        Matrix<double> shapes;
        try
        {
            var svd = Lengthenings(truss, free).Svd(computeVectors: true);
            (values, shapes) = (svd.S.ToArray(), svd.VT);
        }
        catch (NonConvergenceException)
        {
            return "the truss is a mechanism, or too nearly one to be solved; its joints could not be told apart";
        }

        var nullity = free.Length - values.Count(value => value > NullShare * values[0]);
        var moving = nullity > 0
            ? Moving(truss, free, shapes, nullity, StillExact)
            : Moving(truss, free, shapes, 1, StillNear);
        if (nullity == 0 && UnevenStiffness(truss) is { } uneven)
        {
            return uneven;
        }

        if (nullity == 0)
        {
            return $"the truss is nearly a mechanism and cannot be solved accurately: {moving} move most";
        }

        var whole = HoldsTheWhole(truss) ? "" : "; its supports do not hold it as a whole";
        return $"the truss is a mechanism: {moving} can move{whole}";
    }

    private static string? UnevenStiffness(TrussGeometry truss)
    {
        var order = Enumerable.Range(0, truss.Stiffness.Length).OrderBy(m => truss.Stiffness[m]).ToArray();
        var (softest, stiffest) = (order[0], order[^1]);
        var ratio = truss.Stiffness[stiffest] / truss.Stiffness[softest];
        return ratio < Uneven ? null : string.Create(
            CultureInfo.InvariantCulture,
            $"the truss cannot be solved accurately: the stiffness E·A/L of member '{truss.Model.Members[stiffest].Name}' is {ratio:E1} times that of member '{truss.Model.Members[softest].Name}'");
    }

    private static Matrix<double> Lengthenings(TrussGeometry truss, int[] free)
    {
        var column = new Dictionary<int, int>();
        foreach (var d in free)
        {
            column[d] = column.Count;
        }

        var b = Matrix<double>.Build.Dense(truss.CosX.Length, free.Length);
        for (var m = 0; m < truss.CosX.Length; m++)
        {
            var (start, end) = (2 * truss.Model.StartNodes[m], 2 * truss.Model.EndNodes[m]);
            Set(m, start, -truss.CosX[m]);
            Set(m, start + 1, -truss.CosY[m]);
            Set(m, end, truss.CosX[m]);
            Set(m, end + 1, truss.CosY[m]);
        }

        return b;

        void Set(int m, int d, double cosine)
        {
            if (column.TryGetValue(d, out var j))
            {
                b[m, j] = cosine;
            }
        }
    }

    /// <summary>Names the joints that move in the last <paramref name="shapesTaken"/> shapes, "joint A" or "joints A, B".</summary>
    private static string Moving(TrussGeometry truss, int[] free, Matrix<double> shapes, int shapesTaken, double still)
    {
        var squares = new double[truss.Model.Nodes.Length];
        for (var row = shapes.RowCount - shapesTaken; row < shapes.RowCount; row++)
        {
            for (var j = 0; j < free.Length; j++)
            {
                squares[free[j] / 2] += shapes[row, j] * shapes[row, j];
            }
        }

        var largest = squares.Max();
        var names = Enumerable.Range(0, squares.Length).Where(j => squares[j] > still * still * largest).Select(j => truss.Model.Nodes[j].Name).ToArray();
        var named = string.Join(", ", names.Take(MostNamed));
        var more = names.Length > MostNamed ? string.Create(CultureInfo.InvariantCulture, $" and {names.Length - MostNamed} more") : "";
        return (names.Length == 1 ? "joint " : "joints ") + named + more;
    }

    /// <summary>Whether the supports hold a rigid body: two shifts and a turn.</summary>
    private static bool HoldsTheWhole(TrussGeometry truss)
    {
        var nodes = truss.Model.Nodes;
        var (x0, y0) = (nodes[0].XM, nodes[0].YM);
        var sizeM = nodes.Max(node => Math.Max(Math.Abs(node.XM - x0), Math.Abs(node.YM - y0)));
        var rows = Enumerable.Range(0, truss.Held.Length).Where(d => truss.Held[d]).Select(d => d % 2 == 0
            ? new[] { 1.0, 0.0, -(nodes[d / 2].YM - y0) / sizeM }
            : [0.0, 1.0, (nodes[d / 2].XM - x0) / sizeM]);
        return Matrix<double>.Build.DenseOfRowArrays(rows).Svd(computeVectors: false).S.Count(value => value > NullShare) == 3;
    }
}
