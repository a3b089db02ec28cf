using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Cli.Importing;

/// <summary>A file of an import, read once from end to end and not kept.</summary>
/// <param name="Path">Where it is.</param>
/// <param name="Name">Its name within what the user named; the same wherever that lies.</param>
/// <param name="Kind">What it holds.</param>
/// <param name="ItemCount">Structures or policy documents in it.</param>
/// <param name="Hash">SHA-256 over its bytes.</param>
/// <param name="Faults">What keeps the whole file from being read; empty where nothing does.</param>
internal sealed record SourceFile(string Path, string Name, SourceKind Kind, int ItemCount, ImmutableArray<byte> Hash, ImmutableArray<Fault> Faults)
{
    /// <summary>Items that count: a file that cannot be read counts as one at least.</summary>
    public int Counted => Faults.Length > 0 ? Math.Max(1, ItemCount) : ItemCount;
}
