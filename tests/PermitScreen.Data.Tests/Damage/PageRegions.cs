using System.Buffers.Binary;
using Microsoft.Data.Sqlite;

namespace PermitScreen.Data.Tests.Damage;

/// <summary>What stands where in a database file: https://sqlite.org/fileformat2.html, sections 1.3 to 1.6.</summary>
internal static class PageRegions
{
    private const int PageSize = 4096;
    private const int FileHeaderLength = 100;

    /// <summary>Regions of all pages, each with its first byte and length.</summary>
    public static List<(string Region, int Start, int Length)> Of(string path)
    {
        var bytes = File.ReadAllBytes(path);
        var regions = new List<(string Region, int Start, int Length)> { ("file header", 0, FileHeaderLength) };
        var kinds = new string?[bytes.Length / PageSize];
        foreach (var root in Roots(path))
        {
            Walk(bytes, root, kinds, regions);
        }

        Freelist(bytes, kinds, regions);
        for (var page = 0; page < kinds.Length; page++)
        {
            if (kinds[page] is null)
            {
                regions.Add(("overflow", page * PageSize, PageSize));
            }
        }

        return [.. regions.Where(r => r.Length > 0)];
    }

    private static List<int> Roots(string path)
    {
        using var connection = new SqliteConnection($"Data Source={path};Mode=ReadOnly;Pooling=False");
        connection.Open();
        using var command = connection.CreateCommand();
        command.CommandText = "SELECT rootpage FROM sqlite_schema WHERE rootpage > 0";
        using var reader = command.ExecuteReader();
        var roots = new List<int> { 1 };
        while (reader.Read())
        {
            roots.Add(reader.GetInt32(0));
        }

        return roots;
    }

    private static void Walk(byte[] bytes, int page, string?[] kinds, List<(string Region, int Start, int Length)> regions)
    {
        var start = (page - 1) * PageSize;
        var header = start + (page == 1 ? FileHeaderLength : 0);
        var interior = bytes[header] is 2 or 5;
        var name = page == 1 ? "schema" : interior ? "interior" : "leaf";
        kinds[page - 1] = name;
        var headerLength = interior ? 12 : 8;
        var cells = BinaryPrimitives.ReadUInt16BigEndian(bytes.AsSpan(header + 3));
        var content = BinaryPrimitives.ReadUInt16BigEndian(bytes.AsSpan(header + 5));
        var pointers = header + headerLength;
        regions.Add((name + " page header", header, headerLength));
        regions.Add((name + " cell pointers", pointers, 2 * cells));
        regions.Add((name + " unused", pointers + (2 * cells), start + content - pointers - (2 * cells)));
        regions.Add((name + " cells", start + content, PageSize - content));
        if (interior)
        {
            for (var i = 0; i < cells; i++)
            {
                var cell = start + BinaryPrimitives.ReadUInt16BigEndian(bytes.AsSpan(pointers + (2 * i)));
                Walk(bytes, BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(cell)), kinds, regions);
            }

            Walk(bytes, BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(header + 8)), kinds, regions);
        }
    }

    private static void Freelist(byte[] bytes, string?[] kinds, List<(string Region, int Start, int Length)> regions)
    {
        for (var trunk = BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(32)); trunk != 0;)
        {
            var start = (trunk - 1) * PageSize;
            var leaves = BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(start + 4));
            kinds[trunk - 1] = "free";
            regions.Add(("free list", start, 8 + (4 * leaves)));
            for (var i = 0; i < leaves; i++)
            {
                var leaf = BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(start + 8 + (4 * i)));
                kinds[leaf - 1] = "free";
                regions.Add(("free page", (leaf - 1) * PageSize, PageSize));
            }

            trunk = BinaryPrimitives.ReadInt32BigEndian(bytes.AsSpan(start));
        }
    }
}
