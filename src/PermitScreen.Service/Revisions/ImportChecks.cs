using System.Collections.Immutable;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using ImportRefusal = PermitScreen.Catalogue.Storage.ImportRefusal;

namespace PermitScreen.Service.Revisions;

/// <summary>Checks the items of a piece, on all cores.</summary>
/// <param name="door">Checks one item.</param>
internal sealed class ImportChecks(Door door)
{
    /// <summary>The piece, its items kept or refused.</summary>
    /// <param name="index">Index of the piece.</param>
    /// <param name="fingerprint">Digest of the piece as it was sent.</param>
    /// <param name="structures">Structures.</param>
    /// <param name="policies">Policy documents.</param>
    /// <param name="origins">Where each item comes from, structures first; empty where not said.</param>
    /// <param name="cancellation">Ends the checking between items.</param>
    public ImportPiece Check(
        int index, Digest fingerprint, IReadOnlyList<Structure> structures, IReadOnlyList<Policy> policies, IReadOnlyList<string> origins, CancellationToken cancellation)
    {
        var results = new (ResourceContent? Content, ImmutableArray<Fault> Faults)[structures.Count + policies.Count];
        Parallel.For(0, results.Length, new ParallelOptions { CancellationToken = cancellation, MaxDegreeOfParallelism = Environment.ProcessorCount }, i =>
        {
            var faults = new FaultList();
            var content = i < structures.Count ? door.Structure(structures[i], faults) : Door.Policy(policies[i - structures.Count], faults)?.Content;
            results[i] = (content, [.. faults.All]);
        });

        var items = ImmutableArray.CreateBuilder<(ResourceContent, string)>(results.Length);
        var refusals = ImmutableArray.CreateBuilder<ImportRefusal>();
        for (var i = 0; i < results.Length; i++)
        {
            var origin = i < origins.Count ? origins[i] : "";
            if (results[i].Content is { } content)
            {
                items.Add((content, origin));
            }
            else
            {
                refusals.Add(new ImportRefusal(index, i < structures.Count ? structures[i].Name : policies[i - structures.Count].Name, origin, results[i].Faults));
            }
        }

        return new ImportPiece(index, fingerprint, items.ToImmutable(), refusals.ToImmutable());
    }
}
