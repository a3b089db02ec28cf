namespace PermitScreen.Catalogue.Storage;

/// <summary>The records cannot be read or written. Nothing was changed; the message says what happened and how to mend it.</summary>
/// <param name="trouble">What happened.</param>
/// <param name="message">For people.</param>
/// <param name="cause">The cause, where there is one.</param>
public sealed class StoreException(StoreTrouble trouble, string message, Exception? cause = null) : Exception(message, cause)
{
    /// <summary>What happened.</summary>
    public StoreTrouble Trouble { get; } = trouble;
}
