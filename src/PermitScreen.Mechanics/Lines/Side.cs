namespace PermitScreen.Mechanics.Lines;

/// <summary>Which one-sided limit is meant at a chainage where a line jumps.</summary>
public enum Side
{
    /// <summary>Just below the chainage.</summary>
    Before,

    /// <summary>Just above the chainage.</summary>
    After,
}
