namespace PermitScreen.Catalogue.Storage;

/// <summary>A revision without its content. Immutable but for its end; valid in [<see cref="FromVersion"/>, <see cref="ToVersion"/>).</summary>
/// <param name="Kind">Kind of resource.</param>
/// <param name="Name">Resource name.</param>
/// <param name="FromVersion">First catalogue version that has it.</param>
/// <param name="ToVersion">First catalogue version that does not have it any more; null where it is the newest.</param>
/// <param name="Content">Address of its content.</param>
/// <param name="Provenance">Who, why, when.</param>
public sealed record RevisionHead(ResourceKind Kind, string Name, long FromVersion, long? ToVersion, Digest Content, Provenance Provenance)
{
    /// <summary>Whether a catalogue version has this revision.</summary>
    /// <param name="version">Catalogue version.</param>
    public bool HoldsAt(long version) => FromVersion <= version && (ToVersion is not { } end || version < end);
}
