using System.Collections.Immutable;

namespace PermitScreen.Catalogue.Storage;

/// <summary>Content to be kept, which was checked before: nothing malformed gets this far.</summary>
/// <param name="Kind">Kind of resource.</param>
/// <param name="Name">Resource name.</param>
/// <param name="Bytes">Bytes in the canonical form of the contract's message, without etag and catalogue version.</param>
/// <param name="Lines">Addresses of the lines that it needs, each once.</param>
public sealed record ResourceContent(ResourceKind Kind, string Name, ReadOnlyMemory<byte> Bytes, ImmutableArray<Digest> Lines)
{
    /// <summary>Address of the content.</summary>
    public Digest Hash { get; } = Digest.Of(Bytes.Span);
}
