using PermitScreen.Cli.Connection;

namespace PermitScreen.Cli.Importing;

/// <summary>How an import is to be done.</summary>
/// <param name="Author">Who.</param>
/// <param name="Reason">Why.</param>
/// <param name="AllowPartial">Whether it is published without the items refused.</param>
/// <param name="ItemsPerPiece">Most items of a piece.</param>
/// <param name="Keep">Whether an import that is not published stays, in place of being given up.</param>
internal sealed record ImportSettings(Author Author, string Reason, bool AllowPartial, int ItemsPerPiece, bool Keep);
