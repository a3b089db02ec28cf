using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Service.Workers;

/// <summary>What the files of a source hold.</summary>
/// <param name="Structures">Structures, each with its file and its index there.</param>
/// <param name="Faults">Faults of the files as such, each with its file.</param>
internal sealed record SourceFiles(IReadOnlyList<(string File, int Index, Structure Structure)> Structures, IReadOnlyList<(string File, Fault Fault)> Faults)
{
    /// <summary>Reads the structures of files and folders.</summary>
    /// <param name="paths">Files or folders.</param>
    /// <param name="cancellation">Ends the reading between files.</param>
    /// <exception cref="FileNotFoundException">There is no such file or folder.</exception>
    public static SourceFiles Read(IReadOnlyList<string> paths, CancellationToken cancellation)
    {
        var faulty = new List<(string, Fault)>();
        var found = new List<(string File, int Index, Structure Structure)>();
        foreach (var path in paths.SelectMany(p => FolderFiles.Of(p, FileSchemas.Catalogue)))
        {
            cancellation.ThrowIfCancellationRequested();
            var faults = new FaultList();
            if (FileSchemas.ReadCatalogue(File.ReadAllText(path), faults) is { } file)
            {
                found.AddRange(file.Structures.Select((s, i) => (path, i, s)));
            }

            faulty.AddRange(faults.All.Select(f => (path, f)));
        }

        foreach (var twice in found.GroupBy(f => f.Structure.Name).Where(g => g.Count() > 1))
        {
            faulty.Add((string.Join(", ", twice.Select(f => f.File).Distinct()), new Fault("structures.name", $"{twice.Key} stands {twice.Count()} times in the catalogue.")));
        }

        return new SourceFiles(found, faulty);
    }
}
