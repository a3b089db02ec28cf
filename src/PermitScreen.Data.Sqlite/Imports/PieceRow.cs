using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>Fingerprints of the pieces that were staged.</summary>
internal static class PieceRow
{
    private const string Table = "import_pieces";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = "SELECT import, piece, fingerprint, \"check\" FROM import_pieces ORDER BY import, piece";

    /// <summary>The fingerprint of a piece that was staged.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Number of the import.</param>
    /// <param name="piece">Index of the piece.</param>
    public static Digest Read(Database database, long import, int piece)
    {
        using var rows = database.Query(
            Table, "SELECT import, piece, fingerprint, \"check\" FROM import_pieces WHERE import = $1 AND piece = $2", import, (long)piece);
        return rows.Next() ? Read(rows) : throw rows.Damaged(FormattableString.Invariant($"import {import}, piece {piece}"), "it is missing");
    }

    /// <summary>Writes one.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Number of the import.</param>
    /// <param name="piece">Index of the piece.</param>
    /// <param name="fingerprint">Fingerprint.</param>
    public static void Insert(Database database, long import, int piece, Digest fingerprint) => database.Run(
        "INSERT INTO import_pieces (import, piece, fingerprint, \"check\") VALUES ($1, $2, $3, $4)",
        import,
        (long)piece,
        fingerprint.ToArray(),
        Check(import, piece, fingerprint));

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static Digest Read(RowCursor rows)
    {
        var (import, piece, fingerprint) = (rows.Whole(0), rows.Whole(1), rows.Digest(2));
        rows.Compare(3, Check(import, piece, fingerprint), FormattableString.Invariant($"import {import}, piece {piece}"));
        return fingerprint;
    }

    private static byte[] Check(long import, long piece, Digest fingerprint) => new RowForm(Table).Add(import).Add(piece).Add(fingerprint).Check();
}
