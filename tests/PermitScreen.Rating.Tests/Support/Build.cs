using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Tests.Support;

/// <summary>Small parts to rate; their numbers are invented unless a test says otherwise.</summary>
internal static class Build
{
    public static readonly Rung Alone = new()
    {
        RungId = "alone",
        Conditions = "alone",
        OtherTraffic = OtherTraffic.None,
        LateralPlace = LateralPlace.Anywhere,
        LiveLoadRowIds = ["row"],
        Allowance = Allowance.Constant(0.33),
    };

    public static readonly Rung Centreline = Alone with { RungId = "centreline", LateralPlace = LateralPlace.Centreline, CentrelineToleranceM = 0.3 };

    public static readonly Rung Mixed = Alone with { RungId = "mixed", OtherTraffic = OtherTraffic.Mixed, OtherLanesLoaded = true, SameLaneLoaded = true };

    public static AxleTrain Train(double[] loadsKn, double[] offsetsM)
    {
        var faults = new FaultList();
        return AxleTrain.TryCreate(loadsKn, offsetsM, faults) ?? throw new InvalidOperationException(string.Join(' ', faults.All));
    }

    public static AxleTrain RandomTrain(Random random)
    {
        var axles = random.Next(1, 9);
        var loads = new double[axles];
        var offsets = new double[axles];
        for (var i = 0; i < axles; i++)
        {
            loads[i] = 30 + 200 * random.NextDouble();
            offsets[i] = i == 0 ? 0 : offsets[i - 1] + (random.Next(8) == 0 ? 0 : 1 + 6 * random.NextDouble());
        }

        return Train(loads, offsets);
    }

    public static PermitVehicle Vehicle(AxleTrain train, double widthOverTyresM) => new(train, widthOverTyresM, default);

    /// <summary>A row for any truck count; each class is an upper limit (∞ for the last) and its factor.</summary>
    public static LiveLoadRow Row(params (double UpToKnPerM, double Factor)[] classes) =>
        new("row", PermitKind.SpecialSingleTrip, [], [.. classes.Select(c => new LiveLoadClass(c.UpToKnPerM, [c.Factor]))]);

    public static Policy Policy(LiveLoadRow? row = null, LateralRules? lateral = null, PermitVehicle? other = null, ImmutableArray<double>? presence = null, CapacityRules? capacity = null) => new()
    {
        Method = RatingMethod.Lrfr,
        LimitState = LimitState.Strength,
        Level = RatingLevel.Permit,
        DeadLoadFactors = [new DeadLoadFactor(DeadLoadComponent.Dc, 1.25, 0.9, true), new DeadLoadFactor(DeadLoadComponent.Dw, 1.5, 0.65, true), new DeadLoadFactor(DeadLoadComponent.P, 1, 1, false)],
        LiveLoadRows = [row ?? Row((double.PositiveInfinity, 1.1))],
        Rungs = [Mixed, Alone, Centreline],
        OtherLane = new OtherLaneLoad(other ?? Vehicle(Train([50, 70], [0, 4]), 2.44), 1.45, Allowance.Constant(0.33)),
        SameLane = new SameLaneLoad(2.9188, 60.96, true),
        Lateral = lateral ?? new LateralRules(0.6, 1.2),
        MultiplePresence = presence ?? [1, 1, 0.85, 0.65],
        Capacity = capacity ?? Capacity(),
        Weighing = WeighingRule.None,
    };

    /// <summary>Condition and system factors as tests/reference/rating_factors.csv has them; a test compares the policy files with that table.</summary>
    public static CapacityRules Capacity(double floor = 0.85, bool onMeasuredLoss = false) => new(
        [new ConditionFactor(6, 1), new ConditionFactor(5, 0.95), new ConditionFactor(0, 0.85)],
        ImmutableDictionary<SystemKind, double>.Empty
            .Add(SystemKind.WeldedTwoPlane, 0.85)
            .Add(SystemKind.RivetedTwoPlane, 0.90)
            .Add(SystemKind.OtherGirderOrSlab, 1.0),
        floor,
        onMeasuredLoss);

    public static RatedUnit Unit(double leftM, double rightM, params RatedEffect[] effects) =>
        new("unit", new Plane("left", leftM), new Plane("right", rightM), 0, 20, [0, 20], [.. effects], [], []);

    /// <summary>A member whose line rises to 1 at 8 m and falls to −0.4 at 15 m, on a deck of 20 m.</summary>
    public static RatedEffect Effect(string plane = "left") => new()
    {
        UnitId = "unit",
        EffectId = "member",
        PlaneId = plane,
        Description = "axial force in member",
        Kind = EffectKind.AxialForce,
        Line = InfluenceLine.FromPoints([0, 8, 15, 20], [0, 1, -0.4, 0]),
        System = new Stated<SystemKind>(null, SystemKind.OtherGirderOrSlab),
        Condition = new Stated<int>(null, 7),
        Path = "units[0].effects[0]",
    };

    public static Resistance Resistance(double amountKn = 1000) => new(
        EffectSense.Tension, RatingMethod.Lrfr, LimitState.Strength, RatingLevel.Permit, amountKn, Nominal: true, ResistanceFactor: 0.95, false, false, false, "", "resistances[0]");

    public static RatedEffect With(this RatedEffect effect, Stated<int>? condition = null, Stated<SystemKind>? system = null, params Resistance[] resistances) => new()
    {
        UnitId = effect.UnitId,
        EffectId = effect.EffectId,
        PlaneId = effect.PlaneId,
        Description = effect.Description,
        Kind = effect.Kind,
        Line = effect.Line,
        Resistances = [.. resistances],
        System = system ?? effect.System,
        Condition = condition ?? effect.Condition,
        Path = effect.Path,
    };
}
