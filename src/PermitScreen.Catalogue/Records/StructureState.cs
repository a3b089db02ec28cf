namespace PermitScreen.Catalogue.Records;

/// <summary>State of a structure.</summary>
public enum StructureState
{
    /// <summary>Open without restriction.</summary>
    Open = 1,

    /// <summary>Open with posted limits.</summary>
    Posted,

    /// <summary>Closed.</summary>
    Closed,

    /// <summary>Shored.</summary>
    Shored,

    /// <summary>Temporary structure.</summary>
    Temporary,
}
