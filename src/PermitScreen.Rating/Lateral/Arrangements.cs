using System.Collections.Immutable;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Lateral;

/// <summary>Finds the arrangements of vehicles across the roadway that can be the worst ones of a rung.</summary>
/// <remarks>
/// The load on a plane is linear in each vehicle's lateral position (lever rule, statics), and the admissible positions form a
/// convex polytope for each order of vehicles. Its vertices are the packings of some vehicles against the left kerb and
/// the others against the right one, so the worst arrangement is among those listed.
/// </remarks>
public static class Arrangements
{
    /// <summary>Rounding, m, by which vehicles that just fit side by side still count as fitting: more traffic is the safe side.</summary>
    private const double FitRoundingM = 1e-9;

    /// <summary>Lists the arrangements of a rung.</summary>
    /// <param name="roadway">Roadway.</param>
    /// <param name="widthOverTyresM">Width over tyres of the permit vehicle, m.</param>
    /// <param name="rung">Rung.</param>
    /// <param name="policy">Policy.</param>
    /// <param name="blocked">Why the rung cannot be had or assessed, where the answer is empty.</param>
    public static ImmutableArray<Arrangement> Of(Roadway roadway, double widthOverTyresM, Rung rung, Policy policy, out Reason? blocked)
    {
        blocked = null;
        if (CentreInterval(roadway, widthOverTyresM, policy.Lateral) is not var (low, high))
        {
            blocked = new Reason(
                ReasonCode.NoRoomOnRoadway,
                Invariant($"The vehicle is {widthOverTyresM:0.###} m wide over its tyres; between the kerbs are {roadway.WidthM:0.###} m, less {policy.Lateral.KerbDistanceM:0.###} m to each kerb."),
                "roadway");
            return [];
        }

        if (rung.LateralPlace == LateralPlace.Centreline)
        {
            low = Math.Max(low, roadway.CentreM - rung.CentrelineToleranceM);
            high = Math.Min(high, roadway.CentreM + rung.CentrelineToleranceM);
        }

        var alone = policy.MultiplePresence[0];
        ImmutableArray<Arrangement> single = low == high
            ? [new Arrangement(low, [], alone)]
            : [new Arrangement(low, [], alone), new Arrangement(high, [], alone)];
        return rung.OtherLanesLoaded ? WithOthers(single, roadway, widthOverTyresM, policy, out blocked) : single;
    }

    /// <summary>Where the centre of a vehicle can stand, or null where it does not fit between the kerbs.</summary>
    /// <param name="roadway">Roadway.</param>
    /// <param name="widthOverTyresM">Width over tyres, m: never the overall width, which only matters for fit (rule A2).</param>
    /// <param name="rules">Lateral rules.</param>
    public static (double LowM, double HighM)? CentreInterval(Roadway roadway, double widthOverTyresM, LateralRules rules)
    {
        var low = roadway.LeftKerbM + rules.KerbDistanceM + widthOverTyresM / 2;
        var high = roadway.RightKerbM - rules.KerbDistanceM - widthOverTyresM / 2;
        return low <= high ? (low, high) : null;
    }

    private static ImmutableArray<Arrangement> WithOthers(
        ImmutableArray<Arrangement> single, Roadway roadway, double widthOverTyresM, Policy policy, out Reason? blocked)
    {
        blocked = null;
        if (roadway.LaneCount is not { } lanes)
        {
            blocked = new Reason(ReasonCode.DataMissing, "The number of lanes is not in the catalogue; it decides how many other vehicles stand beside the permit.", "roadway.lane_count");
            return [];
        }

        var other = policy.OtherLane ?? throw new InvalidOperationException("A checked policy with loaded other lanes has a vehicle for them.");
        var free = roadway.WidthM - 2 * policy.Lateral.KerbDistanceM - widthOverTyresM;
        var pitch = policy.Lateral.TyreGapM + other.Vehicle.WidthOverTyresM;
        var count = Math.Min(lanes - 1, (int)Math.Floor((free + FitRoundingM) / pitch));
        if (count < 1)
        {
            blocked = new Reason(
                ReasonCode.NoLaneBeside,
                lanes == 1
                    ? "The structure has one lane; none is left for other traffic beside the vehicle."
                    : Invariant($"Beside a vehicle of {widthOverTyresM:0.###} m over its tyres {free:0.###} m are left; another vehicle with its gap needs {pitch:0.###} m."),
                "roadway");
            return [];
        }

        var all = ImmutableArray.CreateBuilder<Arrangement>();
        all.AddRange(single);
        for (var others = 1; others <= count; others++)
        {
            AddPackings(all, roadway, widthOverTyresM, other.Vehicle.WidthOverTyresM, others, policy);
        }

        return all.ToImmutable();
    }

    private static void AddPackings(
        ImmutableArray<Arrangement>.Builder all, Roadway roadway, double permitWidthM, double otherWidthM, int others, Policy policy)
    {
        var presence = policy.MultiplePresence[Math.Min(others + 1, policy.MultiplePresence.Length) - 1];
        for (var permitPlace = 0; permitPlace <= others; permitPlace++)
        {
            for (var packedLeft = 0; packedLeft <= others + 1; packedLeft++)
            {
                var centres = new double[others + 1];
                var edge = roadway.LeftKerbM + policy.Lateral.KerbDistanceM;
                for (var i = 0; i < packedLeft; i++)
                {
                    centres[i] = edge + Width(i) / 2;
                    edge += Width(i) + policy.Lateral.TyreGapM;
                }

                edge = roadway.RightKerbM - policy.Lateral.KerbDistanceM;
                for (var i = others; i >= packedLeft; i--)
                {
                    centres[i] = edge - Width(i) / 2;
                    edge -= Width(i) + policy.Lateral.TyreGapM;
                }

                all.Add(new Arrangement(centres[permitPlace], [.. centres.Where((_, i) => i != permitPlace)], presence));

                double Width(int place) => place == permitPlace ? permitWidthM : otherWidthM;
            }
        }
    }

    private static string Invariant(FormattableString text) => FormattableString.Invariant(text);
}
