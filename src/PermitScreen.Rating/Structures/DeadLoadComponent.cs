namespace PermitScreen.Rating.Structures;

/// <summary>Component of dead load; each has load factors of its own.</summary>
public enum DeadLoadComponent
{
    /// <summary>Structural components and attachments, not split by stage.</summary>
    Dc,

    /// <summary>Structural components on the bare section.</summary>
    Dc1,

    /// <summary>Structural components on the composite section.</summary>
    Dc2,

    /// <summary>Wearing surface and utilities.</summary>
    Dw,

    /// <summary>Other permanent loads, with their sign.</summary>
    P,
}
