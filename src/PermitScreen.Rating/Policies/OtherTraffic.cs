namespace PermitScreen.Rating.Policies;

/// <summary>Who else is on the structure.</summary>
public enum OtherTraffic
{
    /// <summary>Ordinary traffic mixes with the vehicle.</summary>
    Mixed = 1,

    /// <summary>Nobody else is on the structure.</summary>
    None,
}
