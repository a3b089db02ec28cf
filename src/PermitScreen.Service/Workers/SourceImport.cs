using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Workers;

/// <summary>Takes files into fresh records when a service starts on them: one import, all or nothing.</summary>
/// <param name="source">Files.</param>
/// <param name="imports">Records.</param>
/// <param name="checks">Checks the items.</param>
/// <param name="time">Clock.</param>
internal sealed class SourceImport(CatalogueSource source, IImportStore imports, ImportChecks checks, TimeProvider time)
{
    private const string ImportId = "files-read-at-start";
    private const int ItemsInPiece = 500;

    /// <summary>Imports.</summary>
    /// <param name="progress">Told how many structures of how many are checked.</param>
    /// <param name="cancellation">Ends it.</param>
    /// <exception cref="FileFaultsException">Any structure is at fault; all faults of all files are told.</exception>
    public async Task RunAsync(IProgress<(int Done, int All)> progress, CancellationToken cancellation)
    {
        var files = SourceFiles.Read(source.CataloguePaths, cancellation);
        var provenance = new Provenance("service", "files read when the service started", DateTimeOffset.FromUnixTimeMilliseconds(time.GetUtcNow().ToUnixTimeMilliseconds()));
        await imports.BeginAsync(new ImportBeginning(ImportId, "", AllowPartial: false, provenance), cancellation);
        var faulty = new List<(string File, Fault Fault)>(files.Faults);
        var index = 0;
        if (source.Policies.Count > 0)
        {
            await StageAsync([], source.Policies);
        }

        var done = 0;
        foreach (var chunk in files.Structures.Chunk(ItemsInPiece))
        {
            await StageAsync(chunk, []);
            done += chunk.Length;
            progress.Report((done, files.Structures.Count));
        }

        if (faulty.Count > 0)
        {
            throw new FileFaultsException(faulty);
        }

        await imports.PublishAsync(ImportId, index, provenance, cancellation);

        async Task StageAsync((string File, int Index, Structure Structure)[] structures, IReadOnlyList<Policy> policies)
        {
            // Where a fault stands is told by the file and the item's index in it, which travel as the item's origin.
            var origins = structures.Select((_, i) => i.ToString(System.Globalization.CultureInfo.InvariantCulture)).ToList();
            var piece = checks.Check(index, Digest.Of(BitConverter.GetBytes(index)), [.. structures.Select(s => s.Structure)], policies, null, origins, cancellation);
            foreach (var refusal in piece.Refusals)
            {
                var (file, at, _) = structures[int.Parse(refusal.Origin, System.Globalization.CultureInfo.InvariantCulture)];
                var prefix = FormattableString.Invariant($"structures[{at}]");
                faulty.AddRange(refusal.Faults.Select(f => (file, new Fault(f.Path.Length == 0 ? prefix : $"{prefix}.{f.Path}", f.Message))));
            }

            if (faulty.Count == 0)
            {
                await imports.StageAsync(ImportId, piece, cancellation);
                index++;
            }
        }
    }
}
