namespace PermitScreen.Service.Mapping;

/// <summary>Finds the name that a user may have meant.</summary>
internal static class Spelling
{
    private const int LongestName = 100;

    /// <summary>The known name nearest to a wrong one by edit distance, or null where none is near.</summary>
    /// <param name="known">Known names.</param>
    /// <param name="found">What was written.</param>
    public static string? Nearest(IEnumerable<string> known, string found)
    {
        if (found.Length > LongestName)
        {
            return null;
        }

        var best = known
            .Where(name => name.Length <= LongestName)
            .Select(name => (Name: name, Distance: Distance(name, found)))
            .OrderBy(n => n.Distance)
            .ThenBy(n => n.Name, StringComparer.Ordinal)
            .FirstOrDefault();
        return best.Name is { } nearest && best.Distance <= Math.Max(2, found.Length / 3) ? nearest : null;
    }

    /// <summary>Levenshtein distance, case set aside.</summary>
    private static int Distance(string a, string b)
    {
        var row = Enumerable.Range(0, b.Length + 1).ToArray();
        for (var i = 1; i <= a.Length; i++)
        {
            var diagonal = row[0];
            row[0] = i;
            for (var j = 1; j <= b.Length; j++)
            {
                var above = row[j];
                var change = char.ToUpperInvariant(a[i - 1]) == char.ToUpperInvariant(b[j - 1]) ? 0 : 1;
                row[j] = Math.Min(Math.Min(row[j], row[j - 1]) + 1, diagonal + change);
                diagonal = above;
            }
        }

        return row[b.Length];
    }
}
