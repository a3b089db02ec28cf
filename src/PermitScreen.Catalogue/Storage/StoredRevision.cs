namespace PermitScreen.Catalogue.Storage;

/// <summary>A revision with its content, which was compared with its address.</summary>
/// <param name="Head">The revision.</param>
/// <param name="Content">Bytes in the canonical form of the contract's message.</param>
public sealed record StoredRevision(RevisionHead Head, ReadOnlyMemory<byte> Content);
