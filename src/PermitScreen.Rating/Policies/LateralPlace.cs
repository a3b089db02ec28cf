namespace PermitScreen.Rating.Policies;

/// <summary>Where the vehicle drives across the roadway.</summary>
public enum LateralPlace
{
    /// <summary>Anywhere between the kerbs.</summary>
    Anywhere = 1,

    /// <summary>On the roadway's centreline within a tolerance.</summary>
    Centreline,
}
