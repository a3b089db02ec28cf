using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Lines;
using PermitScreen.Rating.Structures;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Enumerations of the contract and of the domain.</summary>
internal static class Enums
{
    public static RatingMethod? ToDomain(this C.RatingMethod method) => method switch
    {
        C.RatingMethod.Lrfr => RatingMethod.Lrfr,
        C.RatingMethod.Lfr => RatingMethod.Lfr,
        C.RatingMethod.AllowableStress => RatingMethod.AllowableStress,
        C.RatingMethod.Eurocode => RatingMethod.Eurocode,
        _ => null,
    };

    public static LimitState? ToDomain(this C.LimitState state) => state switch
    {
        C.LimitState.Strength => LimitState.Strength,
        C.LimitState.Service => LimitState.Service,
        _ => null,
    };

    public static RatingLevel? ToDomain(this C.RatingLevel level) => level switch
    {
        C.RatingLevel.None => RatingLevel.None,
        C.RatingLevel.Inventory => RatingLevel.Inventory,
        C.RatingLevel.Operating => RatingLevel.Operating,
        C.RatingLevel.Legal => RatingLevel.Legal,
        C.RatingLevel.Permit => RatingLevel.Permit,
        _ => null,
    };

    public static EffectSense? ToDomain(this C.EffectSense sense) => sense switch
    {
        C.EffectSense.Tension => EffectSense.Tension,
        C.EffectSense.Compression => EffectSense.Compression,
        C.EffectSense.Bearing => EffectSense.Bearing,
        C.EffectSense.Uplift => EffectSense.Uplift,
        C.EffectSense.Positive => EffectSense.Positive,
        C.EffectSense.Negative => EffectSense.Negative,
        _ => null,
    };

    public static C.EffectSense ToContract(this EffectSense sense) => sense switch
    {
        EffectSense.Tension => C.EffectSense.Tension,
        EffectSense.Compression => C.EffectSense.Compression,
        EffectSense.Bearing => C.EffectSense.Bearing,
        EffectSense.Uplift => C.EffectSense.Uplift,
        EffectSense.Positive => C.EffectSense.Positive,
        _ => C.EffectSense.Negative,
    };

    public static DeadLoadComponent? ToDomain(this C.DeadLoadComponent component) => component switch
    {
        C.DeadLoadComponent.Dc => DeadLoadComponent.Dc,
        C.DeadLoadComponent.Dc1 => DeadLoadComponent.Dc1,
        C.DeadLoadComponent.Dc2 => DeadLoadComponent.Dc2,
        C.DeadLoadComponent.Dw => DeadLoadComponent.Dw,
        C.DeadLoadComponent.P => DeadLoadComponent.P,
        _ => null,
    };

    public static C.DeadLoadComponent ToContract(this DeadLoadComponent component) => component switch
    {
        DeadLoadComponent.Dc => C.DeadLoadComponent.Dc,
        DeadLoadComponent.Dc1 => C.DeadLoadComponent.Dc1,
        DeadLoadComponent.Dc2 => C.DeadLoadComponent.Dc2,
        DeadLoadComponent.Dw => C.DeadLoadComponent.Dw,
        _ => C.DeadLoadComponent.P,
    };

    public static SystemKind? ToDomain(this C.SystemKind kind) =>
        kind == C.SystemKind.Unspecified || !Enum.IsDefined(kind) ? null : (SystemKind)(int)kind;

    public static C.TravelDirection ToContract(this TravelDirection direction) =>
        direction == TravelDirection.Forward ? C.TravelDirection.Forward : C.TravelDirection.Reverse;

    public static C.TravelDirection ToContract(this TravelDirections directions) => directions switch
    {
        TravelDirections.Forward => C.TravelDirection.Forward,
        TravelDirections.Reverse => C.TravelDirection.Reverse,
        _ => C.TravelDirection.Both,
    };

    public static C.Side ToContract(this Side side) => side == Side.Before ? C.Side.Before : C.Side.After;
}
