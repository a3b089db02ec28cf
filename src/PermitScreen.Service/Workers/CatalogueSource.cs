using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Workers;

/// <summary>Files that a service without records of its own takes in when it starts.</summary>
/// <param name="CataloguePaths">Files or folders of structures.</param>
/// <param name="PolicyPaths">Files or folders of policies.</param>
public sealed record CatalogueSource(IReadOnlyList<string> CataloguePaths, IReadOnlyList<string> PolicyPaths)
{
    /// <summary>No files.</summary>
    public static CatalogueSource None { get; } = new([], []);

    /// <summary>Whether there is any file to be taken in.</summary>
    public bool Any => CataloguePaths.Count > 0 || PolicyPaths.Count > 0;

    /// <summary>The policy documents, read before the service starts.</summary>
    internal IReadOnlyList<Policy> Policies { get; init; } = [];

    /// <summary>Reads the policies.</summary>
    /// <exception cref="Files.FileFaultsException">A policy is at fault.</exception>
    public CatalogueSource WithPoliciesRead() => this with { Policies = PolicyLoader.Load(PolicyPaths) };
}
