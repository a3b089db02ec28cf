using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Checks;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes one effect's result for the contract.</summary>
internal static class EffectWriter
{
    /// <summary>The result; the arithmetic only where the view is full. Where the vehicle stands is always told.</summary>
    /// <param name="result">Result.</param>
    /// <param name="full">Whether the arithmetic is written.</param>
    public static C.EffectResult Write(EffectResult result, bool full)
    {
        var written = new C.EffectResult
        {
            Effect = new C.EffectReference
            {
                UnitId = result.Effect.UnitId,
                EffectId = result.Effect.EffectId,
                PlaneId = result.Effect.PlaneId,
                Description = result.Effect.Description,
                Sense = result.Sense.ToContract(),
                Element = result.Element,
            },
            Passes = result.Passes,
            RatingFactorState = result.State switch
            {
                RatingFactorState.Number => C.RatingFactorState.Number,
                RatingFactorState.NoLiveLoad => C.RatingFactorState.NoLiveLoad,
                _ => C.RatingFactorState.DeadLoadExceeds,
            },
            ConfigurationId = result.ConfigurationId,
            Unit = "kN",
        };
        if (result.RatingFactor is { } ratingFactor)
        {
            written.RatingFactor = ratingFactor;
        }

        if (result.LargestAxleFactor is { } k)
        {
            written.LargestAxleFactor = k;
        }

        written.LiveLoads.AddRange(full ? result.LiveLoads.Select(LiveLoad) : result.LiveLoads.Take(1).Select(PlaceOnly));
        if (full)
        {
            written.Capacity = Capacity(result.Capacity);
            written.DeadLoads.AddRange(result.DeadLoads.Select(DeadLoad));
            written.Numerator = result.NumeratorKn;
            written.Denominator = result.DenominatorKn;
        }

        return written;
    }

    private static C.CapacityArithmetic Capacity(CapacityArithmetic capacity) => new()
    {
        GivenResistance = capacity.GivenKn,
        ResistanceFactor = capacity.ResistanceFactor,
        ConditionFactor = capacity.ConditionFactor,
        SystemFactor = capacity.SystemFactor,
        ConditionTimesSystem = capacity.ConditionTimesSystem,
        Capacity = capacity.CapacityKn,
        Note = capacity.Note,
    };

    private static C.DeadLoadArithmetic DeadLoad(DeadLoadArithmetic load) => new()
    {
        Component = load.Component.ToContract(),
        Load = load.LoadKn,
        LoadFactor = load.LoadFactor,
        Factored = load.FactoredKn,
    };

    private static C.LiveLoadArithmetic LiveLoad(LiveLoadArithmetic load)
    {
        var written = PlaceOnly(load);
        written.StaticEffect = load.StaticKn;
        written.LateralShare = load.LateralShare;
        written.MultiplePresence = load.MultiplePresence;
        written.Allowance = load.Allowance;
        written.LiveLoadFactor = load.LiveLoadFactor;
        written.Factored = load.FactoredKn;
        written.FactorNote = load.FactorNote;
        return written;
    }

    private static C.LiveLoadArithmetic PlaceOnly(LiveLoadArithmetic load)
    {
        var written = new C.LiveLoadArithmetic { Description = load.Description };
        if (load.Position is { } position)
        {
            written.Position = Position(position, load);
        }

        return written;
    }

    private static C.TrainPosition Position(TrainPosition position, LiveLoadArithmetic load)
    {
        var written = new C.TrainPosition
        {
            LeadChainageM = position.LeadM,
            Direction = position.Direction.ToContract(),
            Side = load.SideMatters ? position.Side.ToContract() : C.Side.Unspecified,
            CentreLateralM = load.CentreLateralM,
        };
        written.AxlesOnStructure.AddRange(load.AxlesOnDeck);
        return written;
    }
}
