using System.Collections.Immutable;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Catalogue.Records;

/// <summary>One revision of a structure, as far as it could be read: malformed input is refused before it gets here, what is absent stands in <see cref="Gaps"/>.</summary>
public sealed record StructureRecord
{
    /// <summary>Resource name, structures/{structure}.</summary>
    public required string Name { get; init; }

    /// <summary>What people call it.</summary>
    public required string Title { get; init; }

    /// <summary>State; null where not said.</summary>
    public StructureState? State { get; init; }

    /// <summary>Words on the posted signs.</summary>
    public ImmutableArray<string> PostedSigns { get; init; } = [];

    /// <summary>Restrictions for a stretch of time.</summary>
    public ImmutableArray<DatedRestriction> DatedRestrictions { get; init; } = [];

    /// <summary>Room for a vehicle on the structure; null where not said.</summary>
    public Clearance? ClearanceOn { get; init; }

    /// <summary>Room for a vehicle beneath it; null where not said.</summary>
    public Clearance? ClearanceUnder { get; init; }

    /// <summary>Roadway; null where not said.</summary>
    public Roadway? Roadway { get; init; }

    /// <summary>Last inspection; null where not said.</summary>
    public Inspection? Inspection { get; init; }

    /// <summary>Whether an engineer's override is recorded; it is shown and does not yet lift anything.</summary>
    public bool HasOverride { get; init; }

    /// <summary>Superstructure units in order of chainage.</summary>
    public required ImmutableArray<UnitRecord> Units { get; init; }

    /// <summary>What keeps the structure as a whole from being assessed.</summary>
    public ImmutableArray<Reason> Gaps { get; init; } = [];

    /// <summary>Fingerprint of the content.</summary>
    public required string Etag { get; init; }
}
