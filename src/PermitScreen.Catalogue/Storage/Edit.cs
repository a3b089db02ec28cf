namespace PermitScreen.Catalogue.Storage;

/// <summary>One change to one resource.</summary>
public abstract record Edit
{
    private Edit()
    {
    }

    /// <summary>Resource name.</summary>
    public abstract string Name { get; }

    /// <summary>Adds a resource that is not there.</summary>
    /// <param name="Content">Content.</param>
    public sealed record Add(ResourceContent Content) : Edit
    {
        /// <inheritdoc/>
        public override string Name => Content.Name;
    }

    /// <summary>Revises a resource.</summary>
    /// <param name="Content">Content.</param>
    /// <param name="Etag">Etag of the revision that it rests on.</param>
    public sealed record Revise(ResourceContent Content, string Etag) : Edit
    {
        /// <inheritdoc/>
        public override string Name => Content.Name;
    }

    /// <summary>Takes a resource out.</summary>
    /// <param name="Kind">Kind of resource.</param>
    /// <param name="ResourceName">Resource name.</param>
    /// <param name="Etag">Etag of the revision that it rests on.</param>
    public sealed record Remove(ResourceKind Kind, string ResourceName, string Etag) : Edit
    {
        /// <inheritdoc/>
        public override string Name => ResourceName;
    }
}
