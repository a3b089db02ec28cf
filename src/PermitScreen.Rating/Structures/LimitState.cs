namespace PermitScreen.Rating.Structures;

/// <summary>Limit state of a resistance or policy.</summary>
public enum LimitState
{
    /// <summary>Strength.</summary>
    Strength,

    /// <summary>Service.</summary>
    Service,
}
