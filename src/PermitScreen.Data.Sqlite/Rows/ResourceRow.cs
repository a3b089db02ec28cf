using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Rows;

/// <summary>What is known of a resource apart from its revisions: a second witness, in pages of its own, that none of them is missing.</summary>
/// <param name="Kind">Kind of resource.</param>
/// <param name="Name">Resource name.</param>
/// <param name="Revisions">Number of revisions.</param>
/// <param name="NewestFrom">First version of the newest.</param>
/// <param name="NewestTo">First version without it; null where it holds.</param>
internal sealed record ResourceRow(ResourceKind Kind, string Name, long Revisions, long NewestFrom, long? NewestTo)
{
    private const string Table = "resources";
    private const string Columns = "kind, name, revisions, newest_from, newest_to, \"check\"";

    /// <summary>Query for all rows, in order.</summary>
    public const string Every = $"SELECT {Columns} FROM resources ORDER BY kind, name";

    /// <summary>The one of a resource; null where there never was one.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    public static ResourceRow? Find(Database database, ResourceKind kind, string name)
    {
        using var rows = database.Query(Table, $"SELECT {Columns} FROM resources WHERE kind = $1 AND name = $2", (long)kind, name);
        if (!rows.Next())
        {
            return null;
        }

        var row = Read(rows);
        return row.Kind == kind && row.Name == name ? row : throw rows.Damaged(name, $"the search for it led to {row.Name}");
    }

    /// <summary>Writes it, in place of the one that is there.</summary>
    /// <param name="database">Records.</param>
    public void Put(Database database) => database.Run(
        $"INSERT INTO resources ({Columns}) VALUES ($1, $2, $3, $4, $5, $6) ON CONFLICT DO UPDATE SET revisions = $3, newest_from = $4, newest_to = $5, \"check\" = $6",
        (long)Kind,
        Name,
        Revisions,
        NewestFrom,
        NewestTo,
        Check());

    /// <summary>Reads a row and compares its checksum.</summary>
    /// <param name="rows">Rows.</param>
    public static ResourceRow Read(RowCursor rows)
    {
        var row = new ResourceRow((ResourceKind)rows.Small(0), rows.Text(1), rows.Whole(2), rows.Whole(3), rows.WholeOrNull(4));
        rows.Compare(5, row.Check(), row.Name);
        return row;
    }

    private byte[] Check() => new RowForm(Table).Add((long)Kind).Add(Name).Add(Revisions).Add(NewestFrom).Add(NewestTo).Check();
}
