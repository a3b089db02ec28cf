using System.Collections.Concurrent;
using Microsoft.Data.Sqlite;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Schema;

/// <summary>The schema of a file as SQLite keeps it, so that a table or index that was changed or damaged is noticed before it is used.</summary>
internal static class SchemaText
{
    private const string InMemory = ":memory:";

    private static readonly ConcurrentDictionary<SchemaScripts, IReadOnlyList<string>> Known = new();

    /// <summary>The schema of a file, in order.</summary>
    /// <param name="database">File.</param>
    public static IReadOnlyList<string> Of(Database database)
    {
        var found = new List<string>();
        using var rows = database.Query("sqlite_schema", "SELECT type, name, tbl_name, sql FROM sqlite_schema ORDER BY type, name, tbl_name");
        while (rows.Next())
        {
            found.Add($"{rows.Text(0)} {rows.Text(1)} {rows.Text(2)} {rows.TextOrNull(3)}");
        }

        return found;
    }

    /// <summary>The schema that the migrations make.</summary>
    /// <param name="scripts">Migrations.</param>
    public static IReadOnlyList<string> Expected(SchemaScripts scripts) => Known.GetOrAdd(scripts, static s =>
    {
        using var database = Database.Open(InMemory, SqliteOpenMode.Memory, TimeSpan.Zero);
        foreach (var statement in s.Scripts.SelectMany(script => script))
        {
            database.RunOnce(statement);
        }

        return Of(database);
    });
}
