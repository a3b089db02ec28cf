namespace PermitScreen.Rating.Structures;

/// <summary>What an element can carry in one sense, as the catalogue states it.</summary>
/// <param name="Sense">Sense it belongs to.</param>
/// <param name="Method">Rating method; a policy uses only its own (rule D1).</param>
/// <param name="LimitState">Limit state.</param>
/// <param name="Level">Level, where the method knows levels.</param>
/// <param name="AmountKn">Nominal or factored force, kN, ≥ 0.</param>
/// <param name="Nominal">Whether <paramref name="AmountKn"/> is nominal and takes <paramref name="ResistanceFactor"/>.</param>
/// <param name="ResistanceFactor">Resistance factor φ in (0, 1]; null where absent.</param>
/// <param name="IncludesConditionFactor">Whether the amount already holds φc; null where not said.</param>
/// <param name="IncludesSystemFactor">Whether the amount already holds φs; null where not said.</param>
/// <param name="IncludesMeasuredLoss">Whether measured loss is already in the amount; null where not said.</param>
/// <param name="Element">What would fail; named when it governs.</param>
/// <param name="Path">Path of the field in the contract, for reasons.</param>
public sealed record Resistance(
    EffectSense Sense,
    RatingMethod Method,
    LimitState LimitState,
    RatingLevel Level,
    double AmountKn,
    bool Nominal,
    double? ResistanceFactor,
    bool? IncludesConditionFactor,
    bool? IncludesSystemFactor,
    bool? IncludesMeasuredLoss,
    string Element,
    string Path);
