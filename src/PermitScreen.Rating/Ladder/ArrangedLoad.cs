using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Ladder;

/// <summary>Live load of one arrangement on one effect in one sense, split as the factor k asks for it (rule B6).</summary>
public sealed class ArrangedLoad
{
    private readonly RungLoad _load;
    private readonly RatedEffect _effect;
    private readonly Arrangement _arrangement;
    private readonly VehicleEffect _permit;
    private readonly double _permitAllowance;
    private readonly double _laneArea;
    private readonly double _laneKnPerM;
    private readonly ImmutableArray<(VehicleEffect Vehicle, double Allowance, double CentreM)> _others;

    /// <summary>Finds the extremes of every vehicle of the arrangement.</summary>
    /// <param name="load">What loads the unit.</param>
    /// <param name="effect">Effect.</param>
    /// <param name="sense">Sense.</param>
    /// <param name="arrangement">Arrangement.</param>
    /// <param name="extremes">Extremes found so far.</param>
    public ArrangedLoad(RungLoad load, RatedEffect effect, EffectSense sense, Arrangement arrangement, LineExtremes extremes)
    {
        (_load, _effect, _arrangement) = (load, effect, arrangement);
        _permit = VehicleOnPlane.Of(extremes, load.Unit, effect, sense, load.Permit, arrangement.PermitCentreM, load.Directions, load.Policy.Weighing);
        _permitAllowance = load.Rung.Allowance.For(AdverseParts.LobeLengthM(effect.Line, _permit.LineSense, load.Permit.Train, _permit.Position));
        var laneShare = Shares.Of(load.Unit, effect.PlaneId, arrangement.PermitCentreM);
        var laneSense = laneShare >= 0 ? sense.Extreme() : sense.Extreme().Opposite();
        _laneKnPerM = load.SameLaneKnPerM(effect, laneSense);
        _laneArea = Math.Abs(laneShare) * AdverseParts.Area(effect.Line, laneSense);

        var others = ImmutableArray.CreateBuilder<(VehicleEffect, double, double)>(arrangement.OtherCentresM.Length);
        var othersSum = 0.0;
        foreach (var centre in arrangement.OtherCentresM)
        {
            // The vehicles move independently of each other: each has its own worst place and direction (rule A4).
            var lane = load.Policy.OtherLane!;
            var vehicle = VehicleOnPlane.Of(extremes, load.Unit, effect, sense, lane.Vehicle, centre, TravelDirections.Both, WeighingRule.None);
            var allowance = lane.Allowance.For(AdverseParts.LobeLengthM(effect.Line, vehicle.LineSense, lane.Vehicle.Train, vehicle.Position));
            others.Add((vehicle, allowance, centre));
            othersSum += lane.LiveLoadFactor * vehicle.SharedKn * (1 + allowance);
        }

        _others = others.ToImmutable();
        Presence = arrangement.MultiplePresence;
        PermitKn = _permit.SharedKn * (1 + _permitAllowance);
        LaneKn = _laneKnPerM * _laneArea;
        OthersKn = othersSum;
    }

    /// <summary>Multiple presence on everything.</summary>
    public double Presence { get; }

    /// <summary>Permit's shared effect with its allowance, before the live-load factor, kN.</summary>
    public double PermitKn { get; }

    /// <summary>Shared effect of the uniform load in its lane, without allowance, before the live-load factor, kN.</summary>
    public double LaneKn { get; }

    /// <summary>Factored effect of the other vehicles, before multiple presence, kN.</summary>
    public double OthersKn { get; }

    /// <summary>Factored live load with the permit's axle loads multiplied by k, kN.</summary>
    /// <param name="factor">Live-load factor at k.</param>
    /// <param name="k">Factor on the permit's axle loads.</param>
    public double FactoredKn(double factor, double k) => Presence * (factor * (k * PermitKn + LaneKn) + OthersKn);

    /// <summary>The largest k that passes at a live-load factor: +∞ where no axle acts and the rest passes, below 0 where none does.</summary>
    /// <param name="factor">Live-load factor.</param>
    /// <param name="numeratorKn">Capacity less factored dead load, kN.</param>
    public double LargestK(double factor, double numeratorKn)
    {
        if (PermitKn > 0)
        {
            return ((numeratorKn / Presence - OthersKn) / factor - LaneKn) / PermitKn;
        }

        return FactoredKn(factor, 0) <= numeratorKn ? double.PositiveInfinity : double.NegativeInfinity;
    }

    /// <summary>Writes the terms out for people.</summary>
    /// <param name="factor">Live-load factor of the permit.</param>
    /// <param name="factorNote">How it was found.</param>
    public ImmutableArray<LiveLoadArithmetic> Terms(double factor, string factorNote)
    {
        var terms = ImmutableArray.CreateBuilder<LiveLoadArithmetic>();
        if (_permit.SharedKn > 0)
        {
            terms.Add(Term("permit vehicle", _permit, _load.Permit.Train, _permitAllowance, factor, _arrangement.PermitCentreM, factorNote));
        }

        if (LaneKn > 0)
        {
            var share = Math.Abs(Shares.Of(_load.Unit, _effect.PlaneId, _arrangement.PermitCentreM));
            terms.Add(new LiveLoadArithmetic(
                FormattableString.Invariant($"uniform load of {_laneKnPerM:0.###} kN/m in the permit's lane, on the adverse areas, without allowance"),
                _laneKnPerM * (_laneArea / share), share, Presence, 0, factor, Presence * factor * LaneKn, null, false, [], _arrangement.PermitCentreM, factorNote));
        }

        foreach (var (vehicle, allowance, centre) in _others)
        {
            if (vehicle.SharedKn > 0)
            {
                var lane = _load.Policy.OtherLane!;
                terms.Add(Term("vehicle in another lane", vehicle, lane.Vehicle.Train, allowance, lane.LiveLoadFactor, centre, "the policy's factor for the other lanes"));
            }
        }

        return terms.ToImmutable();
    }

    private bool SideMatters(TrainPosition position, AxleTrain train)
    {
        var other = position with { Side = position.Side == Side.Before ? Side.After : Side.Before };
        return Response.At(_effect.Line, train, position, Sense.Max, WeighingRule.None) != Response.At(_effect.Line, train, other, Sense.Max, WeighingRule.None);
    }

    private LiveLoadArithmetic Term(
        string description, VehicleEffect vehicle, AxleTrain train, double allowance, double factor, double centreM, string note) =>
        new(
            description,
            vehicle.StaticKn,
            vehicle.Share,
            Presence,
            allowance,
            factor,
            Presence * factor * vehicle.SharedKn * (1 + allowance),
            vehicle.Position,
            vehicle.Position is { } place && SideMatters(place, train),
            vehicle.Position is { } position ? AxlesOnDeck.Of(train, position, _load.Unit.DeckStartM, _load.Unit.DeckEndM) : [],
            centreM,
            note);
}
