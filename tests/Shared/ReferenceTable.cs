using System.Globalization;
using System.Text;

namespace PermitScreen.Tests.Shared;

/// <summary>A table under tests/reference: comma separated, first row names, quotes around cells with commas.</summary>
internal sealed class ReferenceTable
{
    private readonly Dictionary<string, int> _columns;

    private ReferenceTable(string[] header, IReadOnlyList<string[]> rows)
    {
        _columns = header.Select((name, i) => (name, i)).ToDictionary(pair => pair.name, pair => pair.i, StringComparer.Ordinal);
        Rows = [.. rows.Select(cells => new Row(this, cells))];
    }

    internal IReadOnlyList<Row> Rows { get; }

    internal static ReferenceTable Read(string file)
    {
        var lines = File.ReadAllLines(Repository.Path("tests", "reference", file)).Where(line => line.Length > 0).Select(Split).ToArray();
        return new ReferenceTable(lines[0], lines[1..]);
    }

    private static string[] Split(string line)
    {
        List<string> cells = [];
        var cell = new StringBuilder();
        var quoted = false;
        foreach (var c in line)
        {
            if (c == '"')
            {
                quoted = !quoted;
            }
            else if (c == ',' && !quoted)
            {
                cells.Add(cell.ToString());
                cell.Clear();
            }
            else
            {
                cell.Append(c);
            }
        }

        cells.Add(cell.ToString());
        return [.. cells];
    }

    internal sealed class Row(ReferenceTable table, string[] cells)
    {
        internal string this[string column] => Text(column);

        internal string Text(string column) => cells[table._columns[column]];

        internal bool Has(string column) => Text(column).Length > 0;

        internal double Number(string column) => double.Parse(Text(column), CultureInfo.InvariantCulture);

        internal double[] Numbers(string column) => [.. Text(column).Split(' ').Select(cell => double.Parse(cell, CultureInfo.InvariantCulture))];
    }
}
