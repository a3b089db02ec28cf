using System.Globalization;
using Grpc.Core;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Rating.Policies;
using PermitScreen.Service.Errors;

namespace PermitScreen.Service.Revisions;

/// <summary>Finds the policy document that a resource name means.</summary>
internal static class PolicyDocuments
{
    private const char Mark = '@';

    /// <summary>Documents of a policy, by document version; those that this version of the service cannot read are left out.</summary>
    /// <param name="snapshot">Catalogue.</param>
    /// <param name="policy">Resource name, policies/{policy}.</param>
    public static List<PolicyEntry> Of(CatalogueSnapshot snapshot, string policy) =>
        [.. snapshot.Policies.Values.Where(p => p.Document?.Name == policy).OrderBy(p => p.Document!.DocumentVersion)];

    /// <summary>The newest document of a policy, or the one named; null where there is none.</summary>
    /// <param name="snapshot">Catalogue.</param>
    /// <param name="name">policies/{policy} or policies/{policy}@{version}.</param>
    public static PolicyEntry? Newest(CatalogueSnapshot snapshot, string name) =>
        name.Contains(Mark, StringComparison.Ordinal) ? snapshot.Policies.GetValueOrDefault(name) : Of(snapshot, name).FindLast(_ => true);

    /// <summary>The document to screen under: the one named; or else the newest in force on the day; or else, where none ever was in force, the newest draft.</summary>
    /// <param name="snapshot">Catalogue.</param>
    /// <param name="name">policies/{policy} or policies/{policy}@{version}.</param>
    /// <param name="asOf">Civil date.</param>
    /// <exception cref="RpcException">NOT_FOUND, or FAILED_PRECONDITION where it may not be used on that day.</exception>
    public static PolicyDocument Usable(CatalogueSnapshot snapshot, string name, DateOnly asOf)
    {
        if (name.Contains(Mark, StringComparison.Ordinal))
        {
            var entry = snapshot.Policies.GetValueOrDefault(name) ?? throw NoSuch(snapshot, name);
            return Checked(entry.Document ?? throw BadRequests.Precondition(name, $"This version of the service cannot read {name}; revise it."), asOf);
        }

        var documents = Of(snapshot, name).Select(p => p.Document!).ToList();
        if (documents.Count == 0)
        {
            throw NoSuch(snapshot, name);
        }

        var enacted = documents.Where(d => d.State == PolicyState.InForce).ToList();
        return enacted.FindLast(d => !(asOf < d.InForceFrom) && !(asOf > d.InForceTo))
            ?? Checked(enacted.LastOrDefault() ?? documents.FindLast(d => d.State == PolicyState.Draft) ?? documents[^1], asOf);
    }

    /// <summary>NOT_FOUND, naming the policies that there are.</summary>
    public static RpcException NoSuch(CatalogueSnapshot snapshot, string name)
    {
        var known = snapshot.Policies.Values.Select(p => p.Document is { } d ? (name.Contains(Mark, StringComparison.Ordinal) ? p.Revision.Head.Name : d.Name) : p.Revision.Head.Name).Distinct();
        return BadRequests.NotFound("permitscreen.dev/Policy", name, $"Known are: {string.Join(", ", known)}.");
    }

    private static PolicyDocument Checked(PolicyDocument policy, DateOnly asOf)
    {
        var name = CanonicalForm.DocumentName(policy.Name, policy.DocumentVersion);
        if (policy.State == PolicyState.Withdrawn)
        {
            throw BadRequests.Precondition(policy.Name, $"{name} is withdrawn; screen under a policy that is in force.");
        }

        if (asOf < policy.InForceFrom || asOf > policy.InForceTo)
        {
            throw BadRequests.Precondition(policy.Name, string.Create(CultureInfo.InvariantCulture, $"{name} is not in force on {asOf:yyyy-MM-dd}."));
        }

        return policy;
    }
}
