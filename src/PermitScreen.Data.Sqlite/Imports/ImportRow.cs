using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>An import in its table.</summary>
/// <param name="Number">Number, counted from 1 in the order in which imports were begun.</param>
/// <param name="Head">As callers know it.</param>
/// <param name="RefusedPublishing">How many of the items refused were refused when it was to be published.</param>
internal sealed record ImportRow(long Number, ImportHead Head, int RefusedPublishing)
{
    private const string Table = "imports";

    private const string Columns =
        "number, import_id, state, actor, reason, instant_ms, source_fingerprint, allow_partial, base_version, next_piece, staged, "
        + "refused_staging, refused_publishing, added, revised, unchanged, published_version, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM imports ORDER BY number";

    /// <summary>Items refused while they were staged.</summary>
    public int RefusedStaging => Head.Refused - RefusedPublishing;

    /// <summary>The one of an id; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="importId">Id.</param>
    public static ImportRow? Find(Database database, string importId)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM imports WHERE import_id = $1", importId);
        if (!rows.Next())
        {
            return null;
        }

        var row = Read(rows);
        return row.Head.ImportId == importId ? row : throw rows.Damaged(importId, $"the search for it led to {row.Head.ImportId}");
    }

    /// <summary>Newest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="state">Only those in this state; null for all.</param>
    /// <param name="skip">How many to pass over.</param>
    /// <param name="most">How many at most.</param>
    public static List<ImportRow> List(Database database, ImportState? state, int skip, int most)
    {
        using var rows = database.Query(
            Table, $"SELECT {Columns} FROM imports WHERE $1 IS NULL OR state = $1 ORDER BY number DESC LIMIT $2 OFFSET $3", (long?)state, (long)most, (long)skip);
        var found = new List<ImportRow>();
        while (rows.Next())
        {
            found.Add(Read(rows));
        }

        return found;
    }

    /// <summary>Number for a new import.</summary>
    /// <param name="database">Records.</param>
    public static long NextNumber(Database database) => database.Whole("SELECT coalesce(max(number), 0) + 1 FROM imports");

    /// <summary>Writes it, in place of the one that is there.</summary>
    /// <param name="database">Records.</param>
    public void Put(Database database) => database.Run(
        $"INSERT INTO imports ({Columns}) VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12, $13, $14, $15, $16, $17, $18) "
        + "ON CONFLICT (number) DO UPDATE SET state = $3, next_piece = $10, staged = $11, refused_staging = $12, refused_publishing = $13, "
        + "added = $14, revised = $15, unchanged = $16, published_version = $17, \"check\" = $18",
        Number,
        Head.ImportId,
        (long)Head.State,
        Head.Provenance.Actor,
        Head.Provenance.Reason,
        Instants.Write(Head.Provenance.Instant),
        Head.SourceFingerprint,
        Head.AllowPartial ? 1L : 0L,
        Head.BaseVersion,
        (long)Head.NextPiece,
        (long)Head.Staged,
        (long)RefusedStaging,
        (long)RefusedPublishing,
        (long?)Head.Result?.Added,
        (long?)Head.Result?.Revised,
        (long?)Head.Result?.Unchanged,
        Head.Result?.Version,
        Check());

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static ImportRow Read(RowCursor rows)
    {
        var result = rows.SmallOrNull(13) is { } added ? new ImportResult(added, rows.Small(14), rows.Small(15), rows.WholeOrNull(16)) : null;
        var publishing = rows.Small(12);
        var head = new ImportHead(
            rows.Text(1),
            (ImportState)rows.Small(2),
            rows.Provenance(3),
            rows.Text(6),
            rows.Whole(7) == 1,
            rows.Whole(8),
            rows.Small(9),
            rows.Small(10),
            rows.Small(11) + publishing,
            result);
        var row = new ImportRow(rows.Whole(0), head, publishing);
        rows.Compare(17, row.Check(), head.ImportId);
        return row;
    }

    private byte[] Check() => new RowForm(Table)
        .Add(Number).Add(Head.ImportId).Add((long)Head.State).Add(Head.Provenance).Add(Head.SourceFingerprint).Add(Head.AllowPartial ? 1 : 0).Add(Head.BaseVersion)
        .Add(Head.NextPiece).Add(Head.Staged).Add(RefusedStaging).Add(RefusedPublishing)
        .Add(Head.Result?.Added).Add(Head.Result?.Revised).Add(Head.Result?.Unchanged).Add(Head.Result?.Version).Check();
}
