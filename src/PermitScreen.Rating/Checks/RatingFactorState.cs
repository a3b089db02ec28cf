namespace PermitScreen.Rating.Checks;

/// <summary>Whether a rating factor is a number.</summary>
public enum RatingFactorState
{
    /// <summary>It is.</summary>
    Number = 1,

    /// <summary>No live load in this sense: not applicable (never ∞, rule B7).</summary>
    NoLiveLoad,

    /// <summary>Dead load alone exceeds the capacity (rule B7).</summary>
    DeadLoadExceeds,
}
