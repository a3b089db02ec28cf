using System.Collections.Immutable;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Cli.Importing;

/// <summary>One structure or policy document of a file, or what keeps it from being read.</summary>
/// <param name="Origin">Where it stands.</param>
/// <param name="Structure">The structure, where it is one.</param>
/// <param name="Policy">The policy document, where it is one.</param>
/// <param name="Faults">Faults; then there is neither.</param>
/// <param name="Counted">Items that this stands for: more than one where a whole file cannot be read.</param>
internal sealed record SourceItem(string Origin, Structure? Structure, Policy? Policy, ImmutableArray<Fault> Faults, int Counted = 1)
{
    /// <summary>Bytes that it takes in a message, without what goes around it.</summary>
    public int SizeBytes => (Structure?.CalculateSize() ?? Policy?.CalculateSize() ?? 0) + (4 * Origin.Length);
}
