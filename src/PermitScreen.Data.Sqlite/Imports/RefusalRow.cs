using System.Text.Json;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>Refused items in their table, numbered without a gap: first those found while staging, then those found while publishing.</summary>
internal static class RefusalRow
{
    private const string Table = "import_refusals";
    private const string Columns = "import, place, piece, resource, origin, faults, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM import_refusals ORDER BY import, place";

    /// <summary>Refusals in order, none left out.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Import.</param>
    /// <param name="skip">How many to pass over.</param>
    /// <param name="most">How many at most.</param>
    public static IReadOnlyList<ImportRefusal> Read(Database database, ImportRow import, int skip, int most)
    {
        using var rows = database.Query(
            Table, $"SELECT {Columns} FROM import_refusals WHERE import = $1 AND place >= $2 ORDER BY place LIMIT $3", import.Number, (long)skip, (long)most);
        var found = new List<ImportRefusal>();
        while (rows.Next())
        {
            found.Add(Read(rows).Refusal);
        }

        var expected = Math.Clamp(import.Head.Refused - skip, 0, Math.Max(0, most));
        return found.Count == expected
            ? found
            : throw rows.Damaged(import.Head.ImportId, FormattableString.Invariant($"{found.Count} refusals were found, and there must be {expected}"));
    }

    /// <summary>Writes one.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Number of the import.</param>
    /// <param name="place">Number of the refusal, counted from 0.</param>
    /// <param name="refusal">Refusal.</param>
    public static void Insert(Database database, long import, int place, ImportRefusal refusal)
    {
        var faults = JsonSerializer.Serialize(refusal.Faults.Select(f => new[] { f.Path, f.Message }));
        database.Run(
            $"INSERT INTO import_refusals ({Columns}) VALUES ($1, $2, $3, $4, $5, $6, $7)",
            import,
            (long)place,
            (long)refusal.Piece,
            refusal.Resource,
            refusal.Origin,
            faults,
            Check(import, place, refusal.Piece, refusal.Resource, refusal.Origin, faults));
    }

    /// <summary>Deletes those found while publishing.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Import.</param>
    public static void DeleteThoseOfPublishing(Database database, ImportRow import) =>
        database.Run("DELETE FROM import_refusals WHERE import = $1 AND place >= $2", import.Number, (long)import.RefusedStaging);

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static (long Import, ImportRefusal Refusal) Read(RowCursor rows)
    {
        var (import, place, piece) = (rows.Whole(0), rows.Whole(1), rows.Small(2));
        var (resource, origin, faults) = (rows.Text(3), rows.Text(4), rows.Text(5));
        rows.Compare(6, Check(import, place, piece, resource, origin, faults), FormattableString.Invariant($"import {import}, refusal {place}"));
        var pairs = JsonSerializer.Deserialize<string[][]>(faults) ?? [];
        return (import, new ImportRefusal(piece, resource, origin, [.. pairs.Select(p => new Fault(p[0], p[1]))]));
    }

    private static byte[] Check(long import, long place, long piece, string resource, string origin, string faults) =>
        new RowForm(Table).Add(import).Add(place).Add(piece).Add(resource).Add(origin).Add(faults).Check();
}
