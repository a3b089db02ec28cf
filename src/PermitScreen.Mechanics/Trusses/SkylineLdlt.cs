namespace PermitScreen.Mechanics.Trusses;

/// <summary>A symmetric matrix kept by columns from the first entry that is not zero, and its factors L·D·Lᵀ in the same place.</summary>
/// <remarks>Active-column factorisation (Bathe and Wilson, Numerical Methods in Finite Element Analysis, 1976). Scalar sums in a fixed order:
/// the same bits on every machine.</remarks>
internal sealed class SkylineLdlt
{
    private readonly int[] _firstRow;
    private readonly double[][] _columns;

    /// <param name="firstRow">First row of each column that may hold an entry; length n, 0 ≤ firstRow[j] ≤ j.</param>
    internal SkylineLdlt(int[] firstRow)
    {
        _firstRow = firstRow;
        _columns = new double[firstRow.Length][];
        for (var j = 0; j < firstRow.Length; j++)
        {
            _columns[j] = new double[j - firstRow[j] + 1];
        }
    }

    internal int Size => _columns.Length;

    /// <summary>Smallest pivot met by <see cref="Factor"/>; for a matrix with unit diagonal, near 0 means near singular.</summary>
    internal double SmallestPivot { get; private set; } = double.PositiveInfinity;

    /// <summary>The entry at a row and column with row ≤ column, within the skyline.</summary>
    internal ref double this[int row, int column] => ref _columns[column][row - _firstRow[column]];

    /// <summary>Multiplies row and column j by scale[j].</summary>
    internal void Scale(ReadOnlySpan<double> scale)
    {
        for (var j = 0; j < Size; j++)
        {
            var column = _columns[j];
            for (var i = 0; i < column.Length; i++)
            {
                column[i] *= scale[_firstRow[j] + i] * scale[j];
            }
        }
    }

    /// <summary>Replaces the matrix by its factors.</summary>
    /// <param name="pivotFloor">A pivot that is not above this ends the work.</param>
    /// <returns>Whether every pivot was above the floor.</returns>
    internal bool Factor(double pivotFloor)
    {
        for (var j = 0; j < Size; j++)
        {
            var column = _columns[j];
            var first = _firstRow[j];
            for (var i = first + 1; i < j; i++)
            {
                column[i - first] -= Dot(i, j, i);
            }

            var pivot = column[^1];
            for (var i = first; i < j; i++)
            {
                var scaled = column[i - first] / _columns[i][^1];
                pivot -= scaled * column[i - first];
                column[i - first] = scaled;
            }

            column[^1] = pivot;
            SmallestPivot = Math.Min(SmallestPivot, pivot);
            if (!(pivot > pivotFloor && double.IsFinite(pivot)))
            {
                return false;
            }
        }

        return true;
    }

    /// <summary>Solves for one right-hand side in its place, after <see cref="Factor"/>.</summary>
    internal void Solve(Span<double> b)
    {
        for (var j = 0; j < Size; j++)
        {
            var column = _columns[j];
            var first = _firstRow[j];
            var sum = b[j];
            for (var i = first; i < j; i++)
            {
                sum -= column[i - first] * b[i];
            }

            b[j] = sum;
        }

        for (var j = 0; j < Size; j++)
        {
            b[j] /= _columns[j][^1];
        }

        for (var j = Size - 1; j >= 0; j--)
        {
            var column = _columns[j];
            var first = _firstRow[j];
            for (var i = first; i < j; i++)
            {
                b[i] -= column[i - first] * b[j];
            }
        }
    }

    /// <summary>Sum over the rows above <paramref name="rows"/> that both columns hold; the left column is factored already.</summary>
    private double Dot(int left, int right, int rows)
    {
        var (a, b) = (_columns[left], _columns[right]);
        var (firstA, firstB) = (_firstRow[left], _firstRow[right]);
        var sum = 0.0;
        for (var r = Math.Max(firstA, firstB); r < rows; r++)
        {
            sum += a[r - firstA] * b[r - firstB];
        }

        return sum;
    }
}
