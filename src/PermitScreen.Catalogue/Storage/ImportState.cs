namespace PermitScreen.Catalogue.Storage;

/// <summary>State of an import.</summary>
public enum ImportState
{
    /// <summary>Pieces are being staged.</summary>
    Staging = 1,

    /// <summary>Published.</summary>
    Published,

    /// <summary>Given up.</summary>
    Cancelled,
}
