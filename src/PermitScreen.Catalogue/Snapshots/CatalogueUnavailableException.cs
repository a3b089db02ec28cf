namespace PermitScreen.Catalogue.Snapshots;

/// <summary>The catalogue could not be read or confirmed; there is nothing to screen against.</summary>
/// <param name="message">For people.</param>
/// <param name="reason">Why.</param>
public sealed class CatalogueUnavailableException(string message, Exception? reason = null) : Exception(message, reason);
