using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Revisions;

/// <summary>Rule B9 for documents that come by an import: no way round confirming, enacting and keeping the numbers.</summary>
internal static class ImportedPolicies
{
    /// <summary>Adds a fault where a document may not come in as it is.</summary>
    /// <param name="policy">Document.</param>
    /// <param name="snapshot">What is newest; who changes it before the import is published is not overwritten.</param>
    /// <param name="faults">Takes the fault.</param>
    public static void Check(Policy policy, CatalogueSnapshot snapshot, FaultList faults)
    {
        var name = CanonicalForm.DocumentName(policy);
        if (policy.State == PolicyState.InForce && policy.Confirmation is null && !policy.Demonstration)
        {
            faults.Add("state", "It is in force, but nobody confirmed its numbers; import it as a draft, have it confirmed, and put it in force.");
        }

        if (snapshot.Policies.GetValueOrDefault(name) is not { } entry)
        {
            return;
        }

        var known = CanonicalForm.Policy(entry.Revision);
        if (known.State != PolicyState.Draft && !CanonicalForm.Of(policy).AsSpan().SequenceEqual(entry.Revision.Content.Span))
        {
            faults.Add("state", $"{name} was put in force or withdrawn and stays as it is; give changed numbers the next document_version.");
        }
    }
}
