using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>Single values by name.</summary>
internal static class NoteRow
{
    /// <summary>Version of the mechanics under which addresses of lines were noted.</summary>
    public const string Mechanics = "mechanics version";

    private const string Table = "notes";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = "SELECT value, \"check\", name FROM notes ORDER BY name";

    /// <summary>A value; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="name">Name.</param>
    public static string? Find(Database database, string name)
    {
        using var rows = database.Query(Table, "SELECT value, \"check\" FROM notes WHERE name = $1", name);
        if (!rows.Next())
        {
            return null;
        }

        return Read(rows, name);
    }

    /// <summary>Reads a row of all and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static string Read(RowCursor rows) => Read(rows, rows.Text(2));

    /// <summary>Writes a value.</summary>
    /// <param name="database">Records.</param>
    /// <param name="name">Name.</param>
    /// <param name="value">Value.</param>
    public static void Put(Database database, string name, string value) => database.Run(
        "INSERT INTO notes (name, value, \"check\") VALUES ($1, $2, $3) ON CONFLICT DO UPDATE SET value = $2, \"check\" = $3", name, value, Check(name, value));

    private static string Read(RowCursor rows, string name)
    {
        var value = rows.Text(0);
        rows.Compare(1, Check(name, value), name);
        return value;
    }

    private static byte[] Check(string name, string value) => new RowForm(Table).Add(name).Add(value).Check();
}
