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
    private const int MostNamed = 20;

    /// <summary>Documents of a policy, by document version; also those that this version of the service cannot read.</summary>
    /// <param name="snapshot">Catalogue.</param>
    /// <param name="policy">Resource name, policies/{policy}.</param>
    public static List<PolicyEntry> Of(CatalogueSnapshot snapshot, string policy) =>
        [.. snapshot.Policies.Values.Where(p => p.Revision.Head.Name.StartsWith(policy + Mark, StringComparison.Ordinal)).OrderBy(p => VersionOf(p.Revision.Head.Name))];

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

        var entries = Of(snapshot, name);
        if (entries.Count == 0)
        {
            throw NoSuch(snapshot, name);
        }

        if (entries.Find(e => e.Document is null) is { } unreadable)
        {
            // It may be the one in force: to pass over it would screen under an older one without a word.
            throw BadRequests.Precondition(name, $"This version of the service cannot read {unreadable.Revision.Head.Name}; revise it, or name the document to screen under.");
        }

        var documents = entries.ConvertAll(e => e.Document!);
        return documents.FindLast(d => d.State == PolicyState.InForce && !(asOf < d.InForceFrom) && !(asOf > d.InForceTo))
            ?? Checked(documents.FindLast(d => d.State != PolicyState.Draft) ?? documents[^1], asOf);
    }

    /// <summary>Version in the name of a document.</summary>
    /// <param name="documentName">policies/{policy}@{version}.</param>
    public static int VersionOf(string documentName) => int.Parse(documentName.AsSpan(documentName.LastIndexOf(Mark) + 1), NumberStyles.None, CultureInfo.InvariantCulture);

    /// <summary>NOT_FOUND, naming the policies that there are.</summary>
    public static RpcException NoSuch(CatalogueSnapshot snapshot, string name)
    {
        var known = snapshot.Policies.Keys.Select(k => name.Contains(Mark, StringComparison.Ordinal) ? k : k[..k.LastIndexOf(Mark)]).Distinct().ToList();
        var more = known.Count > MostNamed ? FormattableString.Invariant($" and {known.Count - MostNamed} more") : "";
        return BadRequests.NotFound("permitscreen.dev/Policy", name, $"Known are: {string.Join(", ", known.Take(MostNamed))}{more}.");
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
