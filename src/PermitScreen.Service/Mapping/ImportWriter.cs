using Google.Protobuf.WellKnownTypes;
using PermitScreen.Catalogue.Storage;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes imports for the contract.</summary>
internal static class ImportWriter
{
    private const string Prefix = "imports/";

    /// <summary>Resource name of an import.</summary>
    public static string Name(string importId) => Prefix + importId;

    /// <summary>Id of an import's resource name, which was checked.</summary>
    public static string Id(string name) => name[Prefix.Length..];

    /// <summary>An import.</summary>
    /// <param name="head">Import.</param>
    /// <param name="version">Newest catalogue version.</param>
    public static C.Import Write(ImportHead head, long version)
    {
        var import = new C.Import
        {
            Name = Name(head.ImportId),
            State = head.State switch
            {
                ImportState.Published => C.ImportState.Published,
                ImportState.Cancelled => C.ImportState.Cancelled,
                _ => C.ImportState.Staging,
            },
            Actor = head.Provenance.Actor,
            Reason = head.Provenance.Reason,
            SourceFingerprint = head.SourceFingerprint,
            AllowPartial = head.AllowPartial,
            CreatedAt = Timestamp.FromDateTimeOffset(head.Provenance.Instant),
            BaseVersion = head.BaseVersion,
            NextPieceIndex = head.NextPiece,
            StagedCount = head.Staged,
            RefusedCount = head.Refused,
            CatalogueVersion = version,
        };
        if (head.Result is { } result)
        {
            (import.AddedCount, import.RevisedCount, import.UnchangedCount) = (result.Added, result.Revised, result.Unchanged);
            if (result.Version is { } published)
            {
                import.PublishedVersion = published;
            }
        }

        return import;
    }

    /// <summary>What was refused.</summary>
    public static C.ImportRefusal Write(ImportRefusal refusal)
    {
        var written = new C.ImportRefusal { PieceIndex = refusal.Piece, Resource = refusal.Resource, Origin = refusal.Origin };
        written.Faults.AddRange(refusal.Faults.Select(ReasonWriter.Write));
        return written;
    }
}
