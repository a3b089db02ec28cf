using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>The backlog in its table.</summary>
internal static class BacklogRow
{
    private const string Table = "backlog";
    private const string Columns = "line, structure, content, since_ms, failure, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM backlog ORDER BY line";

    /// <summary>Asks for lines. Those that are pending already stay as they are; those that failed are tried again.</summary>
    /// <param name="database">Records.</param>
    /// <param name="asked">Lines.</param>
    public static void Ask(Database database, PendingLines asked)
    {
        if (Find(database, asked.Key) is not { Failure: null })
        {
            Put(database, asked);
        }
    }

    /// <summary>Writes a row, in place of the one that is there.</summary>
    /// <param name="database">Records.</param>
    /// <param name="row">Row.</param>
    public static void Put(Database database, PendingLines row) => database.Run(
        $"INSERT INTO backlog ({Columns}) VALUES ($1, $2, $3, $4, $5, $6) ON CONFLICT DO UPDATE SET structure = $2, content = $3, since_ms = $4, failure = $5, \"check\" = $6",
        row.Key.ToArray(),
        row.Structure,
        row.Content.ToArray(),
        Instants.Write(row.Since),
        row.Failure,
        Check(row));

    /// <summary>The row of lines; null where they are not on the backlog.</summary>
    /// <param name="database">Records.</param>
    /// <param name="key">Address.</param>
    public static PendingLines? Find(Database database, Digest key)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM backlog WHERE line = $1", key.ToArray());
        return rows.Next() ? Read(rows) : null;
    }

    /// <summary>Whether lines are on the backlog with a failure.</summary>
    /// <param name="database">Records.</param>
    /// <param name="key">Address.</param>
    public static bool HasFailed(Database database, Digest key) => Find(database, key) is { Failure: not null };

    /// <summary>Strikes lines off.</summary>
    /// <param name="database">Records.</param>
    /// <param name="key">Address.</param>
    /// <returns>Number of rows struck.</returns>
    public static int Strike(Database database, Digest key) => database.Run("DELETE FROM backlog WHERE line = $1", key.ToArray());

    /// <summary>Oldest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="failed">Whether those that failed are asked for, or the others.</param>
    /// <param name="most">How many at most.</param>
    public static List<PendingLines> Oldest(Database database, bool failed, long most)
    {
        using var rows = failed
            ? database.Query(Table, $"SELECT {Columns} FROM backlog WHERE failure IS NOT NULL ORDER BY since_ms, line LIMIT $1", most)
            : database.Query(Table, $"SELECT {Columns} FROM backlog WHERE failure IS NULL ORDER BY since_ms, line LIMIT $1", most);
        var found = new List<PendingLines>();
        while (rows.Next())
        {
            found.Add(Read(rows));
        }

        return found;
    }

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static PendingLines Read(RowCursor rows)
    {
        var row = new PendingLines(rows.Digest(0), rows.Text(1), rows.Digest(2), rows.Instant(3), rows.TextOrNull(4));
        rows.Compare(5, Check(row), row.Key.ToString());
        return row;
    }

    private static byte[] Check(PendingLines row) =>
        new RowForm(Table).Add(row.Key).Add(row.Structure).Add(row.Content).Add(Instants.Write(row.Since)).Add(row.Failure).Check();
}
