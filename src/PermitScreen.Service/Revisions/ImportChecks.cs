using System.Collections.Immutable;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using ImportRefusal = PermitScreen.Catalogue.Storage.ImportRefusal;

namespace PermitScreen.Service.Revisions;

/// <summary>Checks the items of a piece, on all cores.</summary>
/// <param name="door">Checks one item.</param>
internal sealed class ImportChecks(Door door)
{
    private const int LongestTold = 2000;
    private const char Unreadable = '\uFFFD';

    /// <summary>The piece, its items kept or refused.</summary>
    /// <param name="index">Index of the piece.</param>
    /// <param name="fingerprint">Digest of the piece as it was sent.</param>
    /// <param name="structures">Structures.</param>
    /// <param name="policies">Policy documents.</param>
    /// <param name="snapshot">What is newest, for the states of policies; null where the records are fresh.</param>
    /// <param name="origins">Where each item comes from, structures first; empty where not said.</param>
    /// <param name="cancellation">Ends the checking between items.</param>
    public ImportPiece Check(
        int index, Digest fingerprint, IReadOnlyList<Structure> structures, IReadOnlyList<Policy> policies, CatalogueSnapshot? snapshot, IReadOnlyList<string> origins, CancellationToken cancellation)
    {
        var results = new (ResourceContent? Content, ImmutableArray<Fault> Faults)[structures.Count + policies.Count];
        Parallel.For(0, results.Length, new ParallelOptions { CancellationToken = cancellation, MaxDegreeOfParallelism = Environment.ProcessorCount }, i =>
        {
            var faults = new FaultList();
            var content = i < structures.Count ? door.Structure(structures[i], faults) : Policy(policies[i - structures.Count], snapshot, faults);
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
                refusals.Add(new ImportRefusal(index, Told(i < structures.Count ? structures[i].Name : policies[i - structures.Count].Name), origin, [.. results[i].Faults.Select(f => new Fault(Told(f.Path), Told(f.Message)))]));
            }
        }

        return new ImportPiece(index, fingerprint, items.ToImmutable(), refusals.ToImmutable());
    }

    private static ResourceContent? Policy(Policy policy, CatalogueSnapshot? snapshot, FaultList faults)
    {
        var content = Door.Policy(policy, faults)?.Content;
        if (content is not null && snapshot is not null)
        {
            ImportedPolicies.Check(policy, snapshot, faults);
        }

        return faults.Any ? null : content;
    }

    /// <summary>What was refused may be anything; it is kept in a form that people can read.</summary>
    private static string Told(string text) =>
        new(Array.ConvertAll((text.Length > LongestTold ? text[..LongestTold] : text).ToCharArray(), c => char.IsControl(c) ? Unreadable : c));
}
