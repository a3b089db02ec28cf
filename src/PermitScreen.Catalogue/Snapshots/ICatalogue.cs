namespace PermitScreen.Catalogue.Snapshots;

/// <summary>Gives the catalogue to those who screen.</summary>
public interface ICatalogue
{
    /// <summary>The newest snapshot; waits until there is one.</summary>
    /// <param name="cancellation">Ends the wait.</param>
    Task<CatalogueSnapshot> CurrentAsync(CancellationToken cancellation);
}
