using Spectre.Console;

namespace PermitScreen.Cli.Printing;

/// <summary>Tables of plain text.</summary>
internal static class Tables
{
    /// <summary>An empty table.</summary>
    /// <param name="columns">Heads; one that begins with ">" stands above numbers, which are set to the right; one that begins with "=" is never broken into lines.</param>
    public static Table Create(params ReadOnlySpan<string> columns)
    {
        var table = new Table().Border(TableBorder.Simple);
        foreach (var column in columns)
        {
            table.AddColumn(column[0] switch
            {
                '>' => new TableColumn(new Text(column[1..])).RightAligned().NoWrap(),
                '=' => new TableColumn(new Text(column[1..])).NoWrap(),
                _ => new TableColumn(new Text(column)),
            });
        }

        return table;
    }

    /// <summary>Adds a row; nothing in it is taken for markup.</summary>
    public static void AddTexts(this Table table, params IEnumerable<string> cells) => table.AddRow(cells.Select(c => new Text(c)));
}
