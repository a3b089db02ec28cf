using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Ladder;

/// <summary>Extremes of shared vehicles.</summary>
public static class VehicleOnPlane
{
    /// <summary>The extreme of a vehicle's shared response.</summary>
    /// <param name="extremes">Extremes found so far.</param>
    /// <param name="unit">Unit.</param>
    /// <param name="effect">Effect.</param>
    /// <param name="sense">Sense.</param>
    /// <param name="vehicle">Vehicle.</param>
    /// <param name="centreM">Lateral position of its centre, m.</param>
    /// <param name="directions">Directions of travel.</param>
    /// <param name="rule">How its axle weights are trusted.</param>
    public static VehicleEffect Of(
        LineExtremes extremes,
        RatedUnit unit,
        RatedEffect effect,
        EffectSense sense,
        PermitVehicle vehicle,
        double centreM,
        TravelDirections directions,
        WeighingRule rule)
    {
        var share = Shares.Of(unit, effect.PlaneId, centreM);
        if (vehicle.HasLateralOffsets)
        {
            return WithOffsets(extremes, unit, effect, sense, vehicle, share, directions, rule);
        }

        var lineSense = share >= 0 ? sense.Extreme() : sense.Extreme().Opposite();
        var extreme = extremes.Of(effect.Line, vehicle.Train, lineSense, directions, rule);
        var magnitude = Math.Abs(extreme.Value);
        return new VehicleEffect(Math.Abs(share) * magnitude, Math.Abs(share), magnitude, lineSense, share == 0 ? null : extreme.Position);
    }

    /// <summary>Axles off the vehicle's centreline: each axle's own share weighs its load, and the offsets change sides with the direction of travel.</summary>
    private static VehicleEffect WithOffsets(
        LineExtremes extremes, RatedUnit unit, RatedEffect effect, EffectSense sense, PermitVehicle vehicle, double share, TravelDirections directions, WeighingRule rule)
    {
        var slope = Shares.SlopePerM(unit, effect.PlaneId);
        Extreme? worst = null;
        foreach (var (flag, side) in new[] { (TravelDirections.Forward, 1.0), (TravelDirections.Reverse, -1.0) })
        {
            if (!directions.HasFlag(flag))
            {
                continue;
            }

            var weights = new double[vehicle.Train.Count];
            for (var i = 0; i < weights.Length; i++)
            {
                weights[i] = vehicle.Train.LoadsKn[i] * (share + side * slope * vehicle.LateralOffsetsM[i]);
            }

            var found = extremes.Find(effect.Line, vehicle.Train.WithLoads(weights), sense.Extreme(), flag, rule);
            if (worst is not { } known || Math.Abs(found.Value) > Math.Abs(known.Value))
            {
                worst = found;
            }
        }

        var extreme = worst ?? throw new ArgumentException("At least one direction of travel is needed.", nameof(directions));
        var shared = Math.Abs(extreme.Value);
        var whole = extreme.Position is { } position
            ? Math.Abs(Response.At(effect.Line, vehicle.Train, position, sense.Extreme(), rule))
            : 0;
        var lineSense = share >= 0 ? sense.Extreme() : sense.Extreme().Opposite();
        return new VehicleEffect(shared, whole > 0 ? shared / whole : 0, whole, lineSense, extreme.Position);
    }
}
