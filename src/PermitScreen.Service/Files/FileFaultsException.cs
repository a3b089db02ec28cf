using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Files;

/// <summary>Faults of files, each with the file that it stands in.</summary>
/// <param name="faults">Faults; at least one.</param>
public sealed class FileFaultsException(IReadOnlyList<(string File, Fault Fault)> faults)
    : Exception(Text(faults))
{
    /// <summary>Every fault with its file.</summary>
    public IReadOnlyList<(string File, Fault Fault)> Faults { get; } = faults;

    private static string Text(IReadOnlyList<(string File, Fault Fault)> faults) =>
        FormattableString.Invariant($"{faults.Count} faults keep the files from being read:")
        + string.Concat(faults.Select(f => $"\n  {f.File}: {f.Fault}"));
}
