using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Importing;

/// <summary>A piece of an import as it is sent.</summary>
/// <param name="Request">The message, but for the import's name.</param>
/// <param name="ItemsSoFar">Items of the whole import up to the end of this piece, those that cannot be read among them.</param>
internal sealed record Piece(StageImportPieceRequest Request, int ItemsSoFar);
