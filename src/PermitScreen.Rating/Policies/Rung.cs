using System.Collections.Immutable;

namespace PermitScreen.Rating.Policies;

/// <summary>One set of travel conditions: an indivisible record (rule B1).</summary>
public sealed record Rung
{
    /// <summary>Id within the policy.</summary>
    public required string RungId { get; init; }

    /// <summary>Conditions in words.</summary>
    public required string Conditions { get; init; }

    /// <summary>Who else is on the structure.</summary>
    public required OtherTraffic OtherTraffic { get; init; }

    /// <summary>Where the vehicle drives.</summary>
    public required LateralPlace LateralPlace { get; init; }

    /// <summary>How far the vehicle's centre may be off the centreline, m, where it drives there; else 0.</summary>
    public double CentrelineToleranceM { get; init; }

    /// <summary>Highest speed, km/h; null means the ordinary speed.</summary>
    public double? SpeedLimitKmPerH { get; init; }

    /// <summary>How far "nobody else" reaches; null where others may be there.</summary>
    public ExclusionExtent? Exclusion { get; init; }

    /// <summary>Whether a vehicle may travel as any other does: a pass under it is a pass without conditions.</summary>
    public bool Unrestricted => OtherTraffic == OtherTraffic.Mixed && LateralPlace == LateralPlace.Anywhere && SpeedLimitKmPerH is null;

    /// <summary>Ids of its live-load rows; the one of the permit's kind is used.</summary>
    public required ImmutableArray<string> LiveLoadRowIds { get; init; }

    /// <summary>Dynamic load allowance of the permit vehicle.</summary>
    public required Allowance Allowance { get; init; }

    /// <summary>Whether a vehicle stands in each other lane.</summary>
    public bool OtherLanesLoaded { get; init; }

    /// <summary>Whether a uniform load stands in the permit's own lane.</summary>
    public bool SameLaneLoaded { get; init; }
}
