namespace PermitScreen.Rating.Policies;

/// <summary>What is done about a structure in doubt.</summary>
public enum DoubtRule
{
    /// <summary>Not assessed; the default.</summary>
    NotAssessed,

    /// <summary>Screened, with a flag beside the verdict.</summary>
    Flag,
}
