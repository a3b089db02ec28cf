using System.Collections.Immutable;

namespace PermitScreen.Cli.Importing;

/// <summary>All that an import reads.</summary>
/// <param name="Files">Files in order of name.</param>
/// <param name="ItemCount">Structures and policy documents in all.</param>
/// <param name="Fingerprint">Tells the same files again: over their names and contents.</param>
internal sealed record Source(ImmutableArray<SourceFile> Files, int ItemCount, string Fingerprint);
