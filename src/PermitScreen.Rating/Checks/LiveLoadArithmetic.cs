using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Rating.Checks;

/// <summary>One live-load term.</summary>
/// <param name="Description">Words: the permit vehicle, a vehicle in another lane, the lane load.</param>
/// <param name="StaticKn">Extreme of the effect from the whole, unshared load in the sense rated, kN, ≥ 0.</param>
/// <param name="LateralShare">Share of the plane, ≥ 0.</param>
/// <param name="MultiplePresence">Multiple presence.</param>
/// <param name="Allowance">IM.</param>
/// <param name="LiveLoadFactor">Live-load factor.</param>
/// <param name="FactoredKn">Product, kN.</param>
/// <param name="Position">Where the load stands; null for a lane load.</param>
/// <param name="SideMatters">Whether an axle stands at a jump of the line, so that the position's side is part of the answer.</param>
/// <param name="AxlesOnDeck">Axles on the deck, counted from 1 at the lead axle.</param>
/// <param name="CentreLateralM">Lateral position of its centre, m.</param>
/// <param name="FactorNote">How the live-load factor was found.</param>
public sealed record LiveLoadArithmetic(
    string Description,
    double StaticKn,
    double LateralShare,
    double MultiplePresence,
    double Allowance,
    double LiveLoadFactor,
    double FactoredKn,
    TrainPosition? Position,
    bool SideMatters,
    ImmutableArray<int> AxlesOnDeck,
    double CentreLateralM,
    string FactorNote);
