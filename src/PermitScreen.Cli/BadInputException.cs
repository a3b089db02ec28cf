namespace PermitScreen.Cli;

/// <summary>Something that the user gave cannot be used; the message says what and how to mend it.</summary>
/// <param name="message">For people.</param>
internal sealed class BadInputException(string message) : Exception(message);
