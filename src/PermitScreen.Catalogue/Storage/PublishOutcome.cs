using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>What became of publishing.</summary>
public abstract record PublishOutcome
{
    private PublishOutcome()
    {
    }

    /// <summary>Published, now or before.</summary>
    /// <param name="Head">The import.</param>
    public sealed record Published(ImportHead Head) : PublishOutcome;

    /// <summary>Items were refused, and the import does not allow that; it can still be given up.</summary>
    /// <param name="Head">The import, with the number of items refused.</param>
    /// <param name="First">The first refusals.</param>
    public sealed record Refused(ImportHead Head, ImmutableArray<ImportRefusal> First) : PublishOutcome;

    /// <summary>The import is given up.</summary>
    /// <param name="Head">The import.</param>
    public sealed record GivenUp(ImportHead Head) : PublishOutcome;

    /// <summary>The number of pieces sent is not the number staged.</summary>
    /// <param name="Head">The import.</param>
    public sealed record PiecesMissing(ImportHead Head) : PublishOutcome;

    /// <summary>There is no such import.</summary>
    public sealed record NoSuchImport : PublishOutcome;
}
