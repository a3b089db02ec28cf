namespace PermitScreen.Rating.Structures;

/// <summary>The sense in which an effect is rated; each kind of effect has two.</summary>
public enum EffectSense
{
    /// <summary>Axial force, positive.</summary>
    Tension,

    /// <summary>Axial force, negative.</summary>
    Compression,

    /// <summary>Vertical reaction, upwards.</summary>
    Bearing,

    /// <summary>Vertical reaction, downwards.</summary>
    Uplift,

    /// <summary>Horizontal reaction, positive.</summary>
    Positive,

    /// <summary>Horizontal reaction, negative.</summary>
    Negative,
}
