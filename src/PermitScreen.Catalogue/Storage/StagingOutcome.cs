namespace PermitScreen.Catalogue.Storage;

/// <summary>What became of a piece.</summary>
public enum StagingOutcome
{
    /// <summary>Kept, now or before.</summary>
    Kept,

    /// <summary>There is no such import.</summary>
    NoSuchImport,

    /// <summary>The import is published or given up.</summary>
    NotStaging,

    /// <summary>Another piece stands under this index.</summary>
    OtherPiece,

    /// <summary>A piece before it is missing.</summary>
    Gap,
}
