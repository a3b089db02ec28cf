namespace PermitScreen.Catalogue.Snapshots;

/// <summary>The catalogue could not be read; there is nothing to screen against.</summary>
/// <param name="reason">Why.</param>
public sealed class CatalogueUnavailableException(Exception reason) : Exception("The catalogue could not be read.", reason);
