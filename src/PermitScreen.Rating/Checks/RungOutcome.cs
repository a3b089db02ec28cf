namespace PermitScreen.Rating.Checks;

/// <summary>How a rung came out.</summary>
public enum RungOutcome
{
    /// <summary>Every rated effect passes.</summary>
    Passes = 1,

    /// <summary>At least one rated effect does not.</summary>
    Fails,

    /// <summary>The conditions cannot be had here.</summary>
    Unavailable,

    /// <summary>Something needed is absent.</summary>
    NotAssessed,
}
