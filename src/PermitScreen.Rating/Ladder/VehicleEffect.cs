using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Rating.Ladder;

/// <summary>What a vehicle at one lateral place does to an effect in one sense.</summary>
/// <param name="SharedKn">Share times the static effect, kN, ≥ 0.</param>
/// <param name="Share">Share of the plane, ≥ 0, or of the opposite sense where the vehicle stands beyond the other plane.</param>
/// <param name="StaticKn">The whole vehicle's static effect where it stands, kN, ≥ 0.</param>
/// <param name="LineSense">The sense of the line that the vehicle loads: the opposite one where the share is negative.</param>
/// <param name="Position">Where it stands; null where nothing of it acts.</param>
public readonly record struct VehicleEffect(double SharedKn, double Share, double StaticKn, Sense LineSense, TrainPosition? Position);
