using System.Runtime.InteropServices;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>Contents by their address, and the addresses of the lines that they need.</summary>
internal static class ContentRow
{
    private const string Table = "contents";
    private const string LinesTable = "content_lines";

    /// <summary>Query for every content with each of its lines.</summary>
    public const string EveryLine = "SELECT content, line, \"check\" FROM content_lines ORDER BY content, line";

    /// <summary>Keeps content and its lines; what is there already stays.</summary>
    /// <param name="database">Records.</param>
    /// <param name="content">Content.</param>
    public static void Put(Database database, ResourceContent content)
    {
        var bytes = MemoryMarshal.TryGetArray(content.Bytes, out var part) && part.Array is { } whole && whole.Length == part.Count ? whole : content.Bytes.ToArray();
        database.Run("INSERT INTO contents (hash, bytes) VALUES ($1, $2) ON CONFLICT DO NOTHING", content.Hash.ToArray(), bytes);
        foreach (var line in content.Lines)
        {
            PutLine(database, content.Hash, line);
        }
    }

    /// <summary>Notes that content needs lines.</summary>
    /// <param name="database">Records.</param>
    /// <param name="content">Address of the content.</param>
    /// <param name="line">Address of the lines.</param>
    public static void PutLine(Database database, Digest content, Digest line) => database.Run(
        "INSERT INTO content_lines (content, line, \"check\") VALUES ($1, $2, $3) ON CONFLICT DO NOTHING", content.ToArray(), line.ToArray(), Check(content, line));

    /// <summary>Forgets which lines content needs.</summary>
    /// <param name="database">Records.</param>
    /// <param name="content">Address of the content.</param>
    public static void ForgetLines(Database database, Digest content) => database.Run("DELETE FROM content_lines WHERE content = $1", content.ToArray());

    /// <summary>Addresses of the lines that content needs.</summary>
    /// <param name="database">Records.</param>
    /// <param name="content">Address of the content.</param>
    public static List<Digest> LinesOf(Database database, Digest content)
    {
        using var rows = database.Query(LinesTable, "SELECT content, line, \"check\" FROM content_lines WHERE content = $1 ORDER BY line", content.ToArray());
        var found = new List<Digest>();
        while (rows.Next())
        {
            found.Add(ReadLine(rows).Line);
        }

        return found;
    }

    /// <summary>Every content with every line that it needs.</summary>
    /// <param name="database">Records.</param>
    public static IEnumerable<(Digest Content, Digest Line)> AllLines(Database database)
    {
        using var rows = database.Query(LinesTable, EveryLine);
        while (rows.Next())
        {
            yield return ReadLine(rows);
        }
    }

    /// <summary>Content.</summary>
    /// <param name="database">Records.</param>
    /// <param name="hash">Address.</param>
    public static byte[] Read(Database database, Digest hash)
    {
        using var rows = database.Query(Table, "SELECT bytes FROM contents WHERE hash = $1", hash.ToArray());
        return rows.Next() ? Compared(database.File, rows.Bytes(0), hash) : throw rows.Damaged(hash.ToString(), "it is missing");
    }

    /// <summary>Whether content is kept.</summary>
    /// <param name="database">Records.</param>
    /// <param name="hash">Address.</param>
    public static bool Has(Database database, Digest hash) =>
        database.Whole("SELECT EXISTS (SELECT 1 FROM contents WHERE hash = $1)", hash.ToArray()) == 1;

    /// <summary>Deletes content that neither a revision nor a staged item names.</summary>
    /// <param name="database">Records.</param>
    /// <param name="hash">Address.</param>
    public static void DropIfUnnamed(Database database, Digest hash)
    {
        var key = hash.ToArray();
        if (database.Whole("SELECT EXISTS (SELECT 1 FROM revisions WHERE content = $1) OR EXISTS (SELECT 1 FROM import_items WHERE content = $1)", key) == 0)
        {
            ForgetLines(database, hash);
            database.Run("DELETE FROM contents WHERE hash = $1", key);
        }
    }

    /// <summary>Compares bytes with their address.</summary>
    /// <param name="file">File, for the message.</param>
    /// <param name="bytes">Bytes.</param>
    /// <param name="hash">Address.</param>
    public static byte[] Compared(string file, byte[] bytes, Digest hash) =>
        Digest.Of(bytes) == hash ? bytes : throw StoreErrors.Damaged(file, Table, hash.ToString(), "the bytes do not fit their address");

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static (Digest Content, Digest Line) ReadLine(RowCursor rows)
    {
        var (content, line) = (rows.Digest(0), rows.Digest(1));
        rows.Compare(2, Check(content, line), $"{content} needs {line}");
        return (content, line);
    }

    private static byte[] Check(Digest content, Digest line) => new RowForm(LinesTable).Add(content).Add(line).Check();
}
