using System.Collections.Immutable;

namespace PermitScreen.Rating.Structures;

/// <summary>A superstructure unit on two planes, ready to be rated.</summary>
/// <param name="UnitId">Id within the structure.</param>
/// <param name="LeftPlane">Plane at the smaller lateral position.</param>
/// <param name="RightPlane">Plane at the greater lateral position.</param>
/// <param name="DeckStartM">Where the deck begins, m on the structure's chainage.</param>
/// <param name="DeckEndM">Where the deck ends, m on the structure's chainage.</param>
/// <param name="BearingsM">Chainages of the vertically held joints, ascending, m.</param>
/// <param name="Effects">Rated effects of both planes.</param>
/// <param name="UnratedBearings">Vertical reactions that are not rated.</param>
/// <param name="Gaps">What keeps this unit, or effects of it, from being assessed on any rung.</param>
public sealed record RatedUnit(
    string UnitId,
    Plane LeftPlane,
    Plane RightPlane,
    double DeckStartM,
    double DeckEndM,
    ImmutableArray<double> BearingsM,
    ImmutableArray<RatedEffect> Effects,
    ImmutableArray<UnratedBearing> UnratedBearings,
    ImmutableArray<Checks.Reason> Gaps)
{
    /// <summary>Longest distance between successive vertically held joints, m.</summary>
    public double LongestSpanM => BearingsM.Zip(BearingsM.Skip(1), (a, b) => b - a).DefaultIfEmpty(0).Max();
}
