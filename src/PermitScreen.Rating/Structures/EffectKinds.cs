using PermitScreen.Mechanics.Extremes;

namespace PermitScreen.Rating.Structures;

/// <summary>The two senses of each kind of effect.</summary>
public static class EffectKinds
{
    /// <summary>The sense with the line's positive sign.</summary>
    /// <param name="kind">Kind of effect.</param>
    public static EffectSense PositiveSense(this EffectKind kind) => kind switch
    {
        EffectKind.AxialForce => EffectSense.Tension,
        EffectKind.VerticalReaction => EffectSense.Bearing,
        _ => EffectSense.Positive,
    };

    /// <summary>The sense with the line's negative sign.</summary>
    /// <param name="kind">Kind of effect.</param>
    public static EffectSense NegativeSense(this EffectKind kind) => kind switch
    {
        EffectKind.AxialForce => EffectSense.Compression,
        EffectKind.VerticalReaction => EffectSense.Uplift,
        _ => EffectSense.Negative,
    };

    /// <summary>Which end of the line's range a sense asks for.</summary>
    /// <param name="sense">Sense of the effect.</param>
    public static Sense Extreme(this EffectSense sense) =>
        sense is EffectSense.Tension or EffectSense.Bearing or EffectSense.Positive ? Sense.Max : Sense.Min;

    /// <summary>The other end of a range.</summary>
    /// <param name="sense">One end.</param>
    public static Sense Opposite(this Sense sense) => sense == Sense.Max ? Sense.Min : Sense.Max;

    /// <summary>+1 for senses of positive sign, −1 for the others.</summary>
    /// <param name="sense">Sense of the effect.</param>
    public static double Sign(this EffectSense sense) => sense.Extreme() == Sense.Max ? 1.0 : -1.0;
}
