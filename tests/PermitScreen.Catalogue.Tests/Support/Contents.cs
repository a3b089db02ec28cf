using System.Text;
using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>What a snapshot holds, for comparison with the records.</summary>
internal static class Contents
{
    internal static Dictionary<string, string> Of(CatalogueSnapshot snapshot) =>
        snapshot.StructuresAfter().Select(s => s.Revision).Concat(snapshot.Policies.Values.Select(p => p.Revision))
            .ToDictionary(r => r.Head.Name, r => Encoding.UTF8.GetString(r.Content.Span), StringComparer.Ordinal);

    /// <summary>The snapshot is that of its version: by walking it, by looking up each name, by count and by sum.</summary>
    internal static void AssertTrue(CatalogueSnapshot snapshot, MemoryStore store)
    {
        var expected = store.At(snapshot.Version);
        Assert.Equal(expected.OrderBy(e => e.Key, StringComparer.Ordinal), Of(snapshot).OrderBy(e => e.Key, StringComparer.Ordinal));
        Assert.Equal(expected.Keys.Count(k => k.StartsWith("structures/", StringComparison.Ordinal)), snapshot.Count);
        Assert.Equal(snapshot.Stamp.State, snapshot.Sum);
        foreach (var (name, content) in expected.Where(e => e.Key.StartsWith("structures/", StringComparison.Ordinal)))
        {
            Assert.Equal(content, snapshot.Find(name)?.Prepared.Record.Title);
        }
    }

    internal static string Structure(int number) => FormattableString.Invariant($"structures/S-{number:00000}");
}
