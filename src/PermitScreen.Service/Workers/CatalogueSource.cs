namespace PermitScreen.Service.Workers;

/// <summary>Where the catalogue and the policies are read from when the service starts.</summary>
/// <param name="CataloguePaths">Files or folders of structures.</param>
/// <param name="PolicyPaths">Files or folders of policies.</param>
public sealed record CatalogueSource(IReadOnlyList<string> CataloguePaths, IReadOnlyList<string> PolicyPaths);
