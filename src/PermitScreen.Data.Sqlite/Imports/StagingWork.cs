using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Records;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>Begins imports, keeps their pieces, and gives them up.</summary>
internal static class StagingWork
{
    /// <summary>Begins an import.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="beginning">Import.</param>
    public static (ImportHead? Head, bool Keep) Begin(Database database, ImportBeginning beginning)
    {
        var provenance = beginning.Provenance with { Instant = Instants.Kept(beginning.Provenance.Instant) };
        if (ImportRow.Find(database, beginning.ImportId)?.Head is { } found)
        {
            var same = found.SourceFingerprint == beginning.SourceFingerprint && found.AllowPartial == beginning.AllowPartial
                && found.Provenance.Actor == provenance.Actor && found.Provenance.Reason == provenance.Reason;
            return (same ? found : null, false);
        }

        var head = new ImportHead(
            beginning.ImportId, ImportState.Staging, provenance, beginning.SourceFingerprint, beginning.AllowPartial, VersionRow.Read(database).Version, 0, 0, 0, Result: null);
        new ImportRow(ImportRow.NextNumber(database), head, RefusedPublishing: 0).Put(database);
        return (head, true);
    }

    /// <summary>Keeps a piece.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="importId">Id of the import.</param>
    /// <param name="piece">Piece.</param>
    public static ((StagingOutcome Outcome, ImportHead? Head) Result, bool Keep) Stage(Database database, string importId, ImportPiece piece)
    {
        if (ImportRow.Find(database, importId) is not { } row)
        {
            return ((StagingOutcome.NoSuchImport, null), false);
        }

        if (row.Head.State != ImportState.Staging)
        {
            return ((StagingOutcome.NotStaging, row.Head), false);
        }

        if (piece.Index < 0 || piece.Index > row.Head.NextPiece)
        {
            return ((StagingOutcome.Gap, row.Head), false);
        }

        if (piece.Index < row.Head.NextPiece)
        {
            var same = PieceRow.Read(database, row.Number, piece.Index) == piece.Fingerprint;
            return ((same ? StagingOutcome.Kept : StagingOutcome.OtherPiece, row.Head), false);
        }

        // What an earlier attempt to publish refused is decided anew next time.
        RefusalRow.DeleteThoseOfPublishing(database, row);
        PieceRow.Insert(database, row.Number, piece.Index, piece.Fingerprint);
        var item = row.Head.Staged;
        foreach (var (content, origin) in piece.Items)
        {
            ContentRow.Put(database, content);
            new ImportItem(row.Number, content.Kind, content.Name, item++, piece.Index, content.Hash, origin).Insert(database);
        }

        var place = row.RefusedStaging;
        foreach (var refusal in piece.Refusals)
        {
            RefusalRow.Insert(database, row.Number, place++, refusal);
        }

        var now = row with { Head = row.Head with { NextPiece = piece.Index + 1, Staged = item, Refused = place }, RefusedPublishing = 0 };
        now.Put(database);
        return ((StagingOutcome.Kept, now.Head), true);
    }

    /// <summary>Gives an import up.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="importId">Id of the import.</param>
    /// <param name="provenance">Who, why, when.</param>
    public static (ImportHead? Head, bool Keep) Cancel(Database database, string importId, Provenance provenance)
    {
        if (ImportRow.Find(database, importId) is not { } row)
        {
            return (null, false);
        }

        if (row.Head.State != ImportState.Staging)
        {
            return (row.Head, false);
        }

        DropItems(database, row.Number);
        var now = row with { Head = row.Head with { State = ImportState.Cancelled } };
        now.Put(database);
        var kept = provenance with { Instant = Instants.Kept(provenance.Instant) };
        ChangeSetWriter.Log(database, VersionRow.Read(database), "cancel import", Subject(importId), kept, version: null, AuditRow.OfNothing);
        return (now.Head, true);
    }

    /// <summary>Deletes what is staged, and the contents that nobody else names.</summary>
    /// <param name="database">Records, in a transaction.</param>
    /// <param name="import">Number of the import.</param>
    public static void DropItems(Database database, long import)
    {
        var contents = ImportItem.Of(database, import).Select(i => i.Content).ToHashSet();
        ImportItem.Delete(database, import);
        foreach (var content in contents)
        {
            ContentRow.DropIfUnnamed(database, content);
        }
    }

    /// <summary>An import as the audit log names it.</summary>
    /// <param name="importId">Id.</param>
    public static string Subject(string importId) => "imports/" + importId;
}
