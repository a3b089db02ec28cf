namespace PermitScreen.Rating.Structures;

/// <summary>Level of a resistance or policy.</summary>
public enum RatingLevel
{
    /// <summary>The method knows no levels.</summary>
    None,

    /// <summary>Inventory.</summary>
    Inventory,

    /// <summary>Operating.</summary>
    Operating,

    /// <summary>Legal load.</summary>
    Legal,

    /// <summary>Permit.</summary>
    Permit,
}
