using System.Collections.Immutable;
using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Rating.Checks;
using PermitScreen.Screening.Applications;

namespace PermitScreen.Screening.Crossings;

/// <summary>One crossing, judged.</summary>
public sealed record CrossingResult
{
    /// <summary>The crossing.</summary>
    public required Crossing Crossing { get; init; }

    /// <summary>The structure; null where it is not in the catalogue.</summary>
    public PreparedStructure? Structure { get; init; }

    /// <summary>Verdict.</summary>
    public required Verdict Verdict { get; init; }

    /// <summary>Basis.</summary>
    public required AssessmentBasis Basis { get; init; }

    /// <summary>Reasons for anything but a pass.</summary>
    public ImmutableArray<Reason> Reasons { get; init; } = [];

    /// <summary>Flags that change no verdict.</summary>
    public ImmutableArray<Reason> Flags { get; init; } = [];

    /// <summary>The ladder; null where nothing was rated.</summary>
    public LadderResult? Ladder { get; init; }
}
