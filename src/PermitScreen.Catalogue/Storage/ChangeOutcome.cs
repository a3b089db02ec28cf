namespace PermitScreen.Catalogue.Storage;

/// <summary>What became of a change.</summary>
public abstract record ChangeOutcome
{
    private ChangeOutcome()
    {
    }

    /// <summary>Done; also where it was done before under the same request id.</summary>
    /// <param name="Version">Catalogue version that it made.</param>
    /// <param name="Content">Address of the content then; null where the resource was taken out.</param>
    /// <param name="Repeated">Whether it was done before.</param>
    public sealed record Done(long Version, Digest? Content, bool Repeated) : ChangeOutcome;

    /// <summary>The content is that of the newest revision: no revision, no version.</summary>
    /// <param name="Newest">The newest revision.</param>
    /// <param name="Version">The newest catalogue version.</param>
    public sealed record Unchanged(RevisionHead Newest, long Version) : ChangeOutcome;

    /// <summary>The resource is there already.</summary>
    /// <param name="Newest">Its newest revision.</param>
    public sealed record Exists(RevisionHead Newest) : ChangeOutcome;

    /// <summary>There is no such resource.</summary>
    public sealed record Missing : ChangeOutcome;

    /// <summary>The change rests on a revision that is not the newest.</summary>
    /// <param name="Newest">The newest revision.</param>
    public sealed record Outdated(RevisionHead Newest) : ChangeOutcome;

    /// <summary>The request id was used for another request.</summary>
    public sealed record RequestIdReused : ChangeOutcome;
}
