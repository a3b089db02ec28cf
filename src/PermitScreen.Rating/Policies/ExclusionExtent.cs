namespace PermitScreen.Rating.Policies;

/// <summary>How far the exclusion of other vehicles reaches (rule A6).</summary>
public enum ExclusionExtent
{
    /// <summary>The superstructure unit.</summary>
    Unit = 1,

    /// <summary>The whole structure.</summary>
    Structure,
}
