using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>A piece of an import, checked item by item.</summary>
/// <param name="Index">Index, counted from 0 without a gap.</param>
/// <param name="Fingerprint">Digest over the piece as it was sent: the same piece sent again is kept once.</param>
/// <param name="Items">Items without fault, each with where it came from.</param>
/// <param name="Refusals">Items refused.</param>
public sealed record ImportPiece(
    int Index, Digest Fingerprint, ImmutableArray<(ResourceContent Content, string Origin)> Items, ImmutableArray<ImportRefusal> Refusals);
