namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Member forces of a determinate chord truss by sections and joints: statics alone, no stiffness.</summary>
/// <remarks>
/// A section through a panel cuts two chords and a diagonal (Ritter). The chord force follows from the beam moment at the joint where the other
/// two meet, over the height there; the diagonal from the horizontal balance, which is the moment about the meeting point of the chords; the
/// vertical from the joint that carries no load. The beam moment follows from the reactions: balance of the whole, and moment 0 at hinges.
/// </remarks>
internal sealed class Sections
{
    private readonly ChordTruss _truss;
    private readonly double[] _reactions;
    private readonly double _loadM;

    internal Sections(ChordTruss truss, int loadedPoint)
    {
        _truss = truss;
        _loadM = truss.PointsM[loadedPoint];
        LoadedPoint = loadedPoint;
        _reactions = Reactions();
    }

    internal int LoadedPoint { get; }

    internal double Reaction(int support) => _reactions[support];

    /// <summary>Force of the named member under 1 kN downwards at the loaded point; tension positive.</summary>
    internal double Force(string member)
    {
        var (kind, i, j) = Parse(member);
        return kind switch
        {
            "LL" => Lower(i),
            "UU" => UpperX(i) / Cos(i, HeightUpper(i), HeightUpper(i + 1)),
            "UL" or "LU" when i == j => Vertical(i),
            "UL" => WebX(i) / Cos(i, HeightUpper(i), 0),
            "LU" => WebX(i) / Cos(i, 0, HeightUpper(j)),
            _ => throw new ArgumentException(member, nameof(member)),
        };
    }

    /// <summary>Beam moment at a panel point, sagging positive.</summary>
    internal double Moment(int point) => MomentAt(_truss.PointsM[point], _reactions);

    private bool HasUpper(int i) => !_truss.EndPosts || (i > 0 && i < _truss.Panels);

    private double HeightUpper(int i) => HasUpper(i) ? _truss.HeightsM[i] : 0;

    private bool Falls(int panel) => !HasUpper(panel + 1) || (HasUpper(panel) && _truss.Diagonals[panel] == Diagonal.Falling);

    /// <summary>Lower chord: moment about the upper joint on the diagonal.</summary>
    private double Lower(int panel) => _truss.LowerGaps.Contains(panel) ? 0 : Falls(panel)
        ? Moment(panel) / _truss.HeightsM[panel]
        : Moment(panel + 1) / _truss.HeightsM[panel + 1];

    /// <summary>Horizontal part of the upper chord: moment about the lower joint on the diagonal.</summary>
    private double UpperX(int panel)
    {
        if (!HasUpper(panel) || !HasUpper(panel + 1) || _truss.UpperGaps.Contains(panel))
        {
            return 0;
        }

        return Falls(panel) ? -Moment(panel + 1) / _truss.HeightsM[panel + 1] : -Moment(panel) / _truss.HeightsM[panel];
    }

    private double WebX(int panel) => -(Lower(panel) + UpperX(panel));

    private double PanelM(int panel) => _truss.PointsM[panel + 1] - _truss.PointsM[panel];

    private double Cos(int panel, double fromM, double toM) =>
        PanelM(panel) / Math.Sqrt((PanelM(panel) * PanelM(panel)) + ((toM - fromM) * (toM - fromM)));

    /// <summary>Vertical: balance of its upper joint.</summary>
    private double Vertical(int i)
    {
        var up = _truss.DeckOnTop && LoadedPoint == i ? -1.0 : 0;
        if (i > 0)
        {
            up += UpperX(i - 1) * (HeightUpper(i - 1) - HeightUpper(i)) / PanelM(i - 1);
            up += Falls(i - 1) ? 0 : -WebX(i - 1) * HeightUpper(i) / PanelM(i - 1);
        }

        if (i < _truss.Panels)
        {
            up += UpperX(i) * (HeightUpper(i + 1) - HeightUpper(i)) / PanelM(i);
            up += Falls(i) ? -WebX(i) * HeightUpper(i) / PanelM(i) : 0;
        }

        return up;
    }

    private double[] Reactions()
    {
        var supports = _truss.SupportedPoints.Select(i => _truss.PointsM[i]).ToArray();
        var hinges = _truss.LowerGaps.Select(panel => Falls(panel) ? panel : panel + 1)
            .Concat(_truss.UpperGaps.Select(panel => Falls(panel) ? panel + 1 : panel)).Select(i => _truss.PointsM[i]).ToArray();
        var rows = new List<double[]>
        {
            supports.Select(_ => 1.0).Append(1).ToArray(),
            supports.Select(x => x).Append(_loadM).ToArray(),
        };
        rows.AddRange(hinges.Select(h => supports.Select(x => Math.Max(h - x, 0)).Append(Math.Max(h - _loadM, 0)).ToArray()));
        return Gauss.Solve([.. rows]);
    }

    private double MomentAt(double xM, double[] reactions)
    {
        var moment = -Math.Max(xM - _loadM, 0);
        for (var s = 0; s < reactions.Length; s++)
        {
            moment += reactions[s] * Math.Max(xM - _truss.PointsM[_truss.SupportedPoints[s]], 0);
        }

        return moment;
    }

    private static (string Kind, int First, int Second) Parse(string member)
    {
        var second = member.IndexOfAny(['L', 'U'], 1);
        var (i, j) = (int.Parse(member[1..second], System.Globalization.CultureInfo.InvariantCulture),
            int.Parse(member[(second + 1)..], System.Globalization.CultureInfo.InvariantCulture));
        return ($"{member[0]}{member[second]}", i, j);
    }
}

/// <summary>Elimination with row pivoting for the few equations of a test.</summary>
internal static class Gauss
{
    /// <param name="rows">Equations with the right-hand side as their last number.</param>
    internal static double[] Solve(double[][] rows)
    {
        var n = rows.Length;
        for (var c = 0; c < n; c++)
        {
            var pivot = Enumerable.Range(c, n - c).MaxBy(r => Math.Abs(rows[r][c]));
            (rows[c], rows[pivot]) = (rows[pivot], rows[c]);
            for (var r = 0; r < n; r++)
            {
                if (r == c)
                {
                    continue;
                }

                var factor = rows[r][c] / rows[c][c];
                for (var k = c; k <= n; k++)
                {
                    rows[r][k] -= factor * rows[c][k];
                }
            }
        }

        return [.. Enumerable.Range(0, n).Select(r => rows[r][n] / rows[r][r])];
    }
}
