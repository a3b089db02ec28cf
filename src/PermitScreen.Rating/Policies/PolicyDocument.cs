namespace PermitScreen.Rating.Policies;

/// <summary>A policy as a versioned document.</summary>
public sealed record PolicyDocument
{
    /// <summary>Resource name, policies/{policy}.</summary>
    public required string Name { get; init; }

    /// <summary>What people call it.</summary>
    public required string Title { get; init; }

    /// <summary>Edition of the standard that it follows.</summary>
    public required string Edition { get; init; }

    /// <summary>Version of the document, counted from 1.</summary>
    public required int DocumentVersion { get; init; }

    /// <summary>State.</summary>
    public required PolicyState State { get; init; }

    /// <summary>First day in force; null where not in force or always.</summary>
    public DateOnly? InForceFrom { get; init; }

    /// <summary>Last day in force; null means until withdrawn.</summary>
    public DateOnly? InForceTo { get; init; }

    /// <summary>Whether a named person confirmed its numbers for the authority.</summary>
    public bool Confirmed { get; init; }

    /// <summary>Whether it is the demo's own policy.</summary>
    public bool Demonstration { get; init; }

    /// <summary>Fingerprint of the document.</summary>
    public required string Etag { get; init; }

    /// <summary>The numbers.</summary>
    public required Policy Policy { get; init; }

    /// <summary>Fit and standing.</summary>
    public required StandingRules Standing { get; init; }
}
