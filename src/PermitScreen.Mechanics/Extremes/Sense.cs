namespace PermitScreen.Mechanics.Extremes;

/// <summary>Which extreme of an effect is sought.</summary>
public enum Sense
{
    /// <summary>The supremum; ≥ 0, because the empty structure counts.</summary>
    Max,

    /// <summary>The infimum; ≤ 0, because the empty structure counts.</summary>
    Min,
}
