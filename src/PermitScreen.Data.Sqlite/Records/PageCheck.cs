using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>SQLite's own check of every page, with the indices compared with their tables.</summary>
internal static class PageCheck
{
    private const string Sound = "ok";

    /// <summary>What is wrong with the pages.</summary>
    /// <param name="database">File.</param>
    public static IReadOnlyList<string> Problems(Database database)
    {
        var found = new List<string>();
        using var rows = database.Query("pages", "PRAGMA integrity_check");
        while (rows.Next())
        {
            if (rows.Text(0) is var line && line != Sound)
            {
                found.Add(line);
            }
        }

        return found;
    }

    /// <summary>Refuses a file with damaged pages: writing to it could make the damage worse.</summary>
    /// <param name="database">File.</param>
    /// <exception cref="StoreException">Pages are damaged.</exception>
    public static void Demand(Database database)
    {
        if (Problems(database) is [var first, ..])
        {
            throw new StoreException(StoreTrouble.Damaged, StoreErrors.Message(StoreTrouble.Damaged, database.File, first.ReplaceLineEndings(" ")));
        }
    }
}
