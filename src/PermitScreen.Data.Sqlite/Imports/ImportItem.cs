using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Imports;

/// <summary>A staged item in its table; its content stands with the other contents.</summary>
/// <param name="Import">Number of the import.</param>
/// <param name="Kind">Kind of resource.</param>
/// <param name="Name">Resource name.</param>
/// <param name="Item">Number of the item in the import, counted from 0.</param>
/// <param name="Piece">Index of its piece.</param>
/// <param name="Content">Address of its content.</param>
/// <param name="Origin">Where it came from.</param>
internal sealed record ImportItem(long Import, ResourceKind Kind, string Name, int Item, int Piece, Digest Content, string Origin)
{
    private const string Table = "import_items";
    private const string Columns = "import, kind, name, item, piece, content, origin, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM import_items ORDER BY import, kind, name, item";

    /// <summary>Items of an import in order of kind, name and number.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Number of the import.</param>
    public static IEnumerable<ImportItem> Of(Database database, long import)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM import_items WHERE import = $1 ORDER BY kind, name, item", import);
        while (rows.Next())
        {
            yield return Read(rows);
        }
    }

    /// <summary>Deletes the items of an import.</summary>
    /// <param name="database">Records.</param>
    /// <param name="import">Number of the import.</param>
    public static void Delete(Database database, long import) => database.Run("DELETE FROM import_items WHERE import = $1", import);

    /// <summary>Writes it.</summary>
    /// <param name="database">Records.</param>
    public void Insert(Database database) => database.Run(
        $"INSERT INTO import_items ({Columns}) VALUES ($1, $2, $3, $4, $5, $6, $7, $8)",
        Import,
        (long)Kind,
        Name,
        (long)Item,
        (long)Piece,
        Content.ToArray(),
        Origin,
        Check());

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static ImportItem Read(RowCursor rows)
    {
        var item = new ImportItem(rows.Whole(0), (ResourceKind)rows.Small(1), rows.Text(2), rows.Small(3), rows.Small(4), rows.Digest(5), rows.Text(6));
        rows.Compare(7, item.Check(), FormattableString.Invariant($"import {item.Import}, {item.Name}"));
        return item;
    }

    private byte[] Check() => new RowForm(Table).Add(Import).Add((long)Kind).Add(Name).Add(Item).Add(Piece).Add(Content).Add(Origin).Check();
}
