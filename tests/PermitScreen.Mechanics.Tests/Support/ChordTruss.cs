namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Which way the diagonal of a panel runs.</summary>
internal enum Diagonal
{
    /// <summary>From the upper joint on the left to the lower joint on the right.</summary>
    Falling,

    /// <summary>From the lower joint on the left to the upper joint on the right.</summary>
    Rising,

    /// <summary>Both.</summary>
    Crossed,
}

/// <summary>A truss with verticals at every panel point: lower joints L0..Ln on a level line, upper joints U above them.</summary>
internal sealed record ChordTruss
{
    /// <summary>Chainage of panel points 0..n, m.</summary>
    internal required double[] PointsM { get; init; }

    /// <summary>Height at panel points 0..n, m.</summary>
    internal required double[] HeightsM { get; init; }

    /// <summary>Diagonal of panels 0..n−1.</summary>
    internal required Diagonal[] Diagonals { get; init; }

    /// <summary>Panel points that stand on a support; the first is pinned, the others roll.</summary>
    internal required int[] SupportedPoints { get; init; }

    /// <summary>Whether inclined end posts L0U1 and U(n−1)Ln take the place of the end verticals.</summary>
    internal bool EndPosts { get; init; }

    /// <summary>Whether the deck lies on the upper chord.</summary>
    internal bool DeckOnTop { get; init; }

    /// <summary>Panels without a lower chord member: a hinge at the upper joint where the diagonal meets the upper chord.</summary>
    internal int[] LowerGaps { get; init; } = [];

    /// <summary>Panels without an upper chord member.</summary>
    internal int[] UpperGaps { get; init; } = [];

    internal int Panels => PointsM.Length - 1;

    internal static ChordTruss Of(double[] panelsM, double[] heightsM, Diagonal[] diagonals, int[]? supported = null)
    {
        var pointsM = new double[panelsM.Length + 1];
        for (var i = 0; i < panelsM.Length; i++)
        {
            pointsM[i + 1] = pointsM[i] + panelsM[i];
        }

        return new ChordTruss { PointsM = pointsM, HeightsM = heightsM, Diagonals = diagonals, SupportedPoints = supported ?? [0, panelsM.Length] };
    }

    /// <summary>Diagonals that pull under full load: falling towards midspan.</summary>
    internal static Diagonal[] Pratt(int panels) => [.. Enumerable.Range(0, panels).Select(i => i < panels / 2 ? Diagonal.Falling : Diagonal.Rising)];

    /// <summary>Diagonals that push under full load: rising towards midspan.</summary>
    internal static Diagonal[] Howe(int panels) => [.. Enumerable.Range(0, panels).Select(i => i < panels / 2 ? Diagonal.Rising : Diagonal.Falling)];

    internal static Diagonal[] Alternating(int panels) => [.. Enumerable.Range(0, panels).Select(i => i % 2 == 0 ? Diagonal.Rising : Diagonal.Falling)];

    internal TrussSketch Sketch(Func<int, double>? stiffnessKn = null)
    {
        var sketch = new TrussSketch();
        var upper = Enumerable.Range(0, Panels + 1).Where(i => !EndPosts || (i > 0 && i < Panels)).ToHashSet();
        for (var i = 0; i <= Panels; i++)
        {
            sketch.Joint($"L{i}", PointsM[i], 0);
        }

        foreach (var i in upper.Order())
        {
            sketch.Joint($"U{i}", PointsM[i], HeightsM[i]);
        }

        for (var i = 0; i < Panels; i++)
        {
            AddPanel(i);
        }

        foreach (var i in upper.Order())
        {
            Bar($"U{i}", $"L{i}");
        }

        sketch.Pin($"L{SupportedPoints[0]}");
        foreach (var i in SupportedPoints.Skip(1))
        {
            sketch.Roller($"L{i}");
        }

        return sketch.Deck([.. Enumerable.Range(0, Panels + 1).Where(i => !DeckOnTop || upper.Contains(i)).Select(i => (DeckOnTop ? "U" : "L") + i)]);

        void AddPanel(int i)
        {
            if (!LowerGaps.Contains(i))
            {
                Bar($"L{i}", $"L{i + 1}");
            }

            if (upper.Contains(i) && upper.Contains(i + 1) && !UpperGaps.Contains(i))
            {
                Bar($"U{i}", $"U{i + 1}");
            }

            if (upper.Contains(i) && (Diagonals[i] != Diagonal.Rising || !upper.Contains(i + 1)))
            {
                Bar($"U{i}", $"L{i + 1}");
            }

            if (upper.Contains(i + 1) && (Diagonals[i] != Diagonal.Falling || !upper.Contains(i)))
            {
                Bar($"L{i}", $"U{i + 1}");
            }
        }

        void Bar(string a, string b) => sketch.Bar(a, b, stiffnessKn?.Invoke(sketch.Members.Count) ?? 2e6);
    }
}
