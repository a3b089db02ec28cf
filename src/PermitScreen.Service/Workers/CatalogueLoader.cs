using System.Collections.Immutable;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Workers;

/// <summary>Reads structures from files and computes the influence lines of their members.</summary>
/// <param name="lines">Lines known so far.</param>
public sealed class CatalogueLoader(LineCache lines)
{
    /// <summary>Catalogue version of a catalogue that is read from files once.</summary>
    public const long Version = 1;

    /// <summary>Reads all structures: all or nothing.</summary>
    /// <param name="paths">Files or folders.</param>
    /// <param name="progress">Told how many structures of how many are ready.</param>
    /// <param name="cancellation">Cancels between structures.</param>
    /// <returns>The snapshot, and the structures as the contract shows them.</returns>
    /// <exception cref="FileFaultsException">Any structure is at fault; all faults of all files are told.</exception>
    public (CatalogueSnapshot Snapshot, IReadOnlyList<Structure> Structures) Load(
        IReadOnlyList<string> paths, IProgress<(int Done, int All)>? progress, CancellationToken cancellation)
    {
        var faulty = new List<(string File, Fault Fault)>();
        var found = new List<(string File, int Index, Structure Structure)>();
        foreach (var path in paths.SelectMany(p => FolderFiles.Of(p, FileSchemas.Catalogue)))
        {
            var faults = new FaultList();
            if (FileSchemas.ReadCatalogue(File.ReadAllText(path), faults) is { } file)
            {
                found.AddRange(file.Structures.Select((s, i) => (path, i, s)));
            }

            faulty.AddRange(faults.All.Select(f => (path, f)));
        }

        var prepared = new List<PreparedStructure>();
        foreach (var (file, index, structure) in found)
        {
            cancellation.ThrowIfCancellationRequested();
            var faults = new FaultList();
            if (Prepare(structure, faults.At("structures", index)) is { } ready)
            {
                prepared.Add(ready);
            }

            faulty.AddRange(faults.All.Select(f => (file, f)));
            progress?.Report((prepared.Count, found.Count));
        }

        foreach (var twice in found.GroupBy(f => f.Structure.Name).Where(g => g.Count() > 1))
        {
            faulty.Add((string.Join(", ", twice.Select(f => f.File).Distinct()), new Fault("structures.name", $"{twice.Key} stands {twice.Count()} times in the catalogue.")));
        }

        if (faulty.Count > 0)
        {
            throw new FileFaultsException(faulty);
        }

        var snapshot = new CatalogueSnapshot(Version, prepared.ToImmutableSortedDictionary(p => p.Record.Name, p => p, StringComparer.Ordinal));
        return (snapshot, [.. found.Select(f => f.Structure)]);
    }

    private PreparedStructure? Prepare(Structure structure, FaultList faults)
    {
        if (StructureMapper.Map(structure, faults) is not { } record)
        {
            return null;
        }

        structure.Etag = record.Etag;
        structure.CatalogueVersion = Version;
        return StructurePreparation.Prepare(record, lines, faults);
    }
}
