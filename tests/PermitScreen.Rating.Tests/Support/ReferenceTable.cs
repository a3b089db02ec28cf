using System.Text;

namespace PermitScreen.Rating.Tests.Support;

/// <summary>A table under tests/reference: comma separated, first row names, quotes around cells with commas.</summary>
internal static class ReferenceTable
{
    /// <summary>Its rows, each from column name to cell.</summary>
    public static IReadOnlyList<IReadOnlyDictionary<string, string>> Read(string file)
    {
        var lines = File.ReadAllLines(Repository.Path("tests", "reference", file)).Where(l => l.Length > 0).Select(Split).ToList();
        return [.. lines.Skip(1).Select(cells => lines[0].Zip(cells).ToDictionary(c => c.First, c => c.Second))];
    }

    private static List<string> Split(string line)
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
        return cells;
    }
}
