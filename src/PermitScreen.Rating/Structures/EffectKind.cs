namespace PermitScreen.Rating.Structures;

/// <summary>What an effect is. Everything downstream asks only for its two senses.</summary>
public enum EffectKind
{
    /// <summary>Axial force of a member, kN; tension positive.</summary>
    AxialForce,

    /// <summary>Vertical reaction, kN; upwards positive.</summary>
    VerticalReaction,

    /// <summary>Horizontal reaction, kN; towards increasing chainage positive.</summary>
    HorizontalReaction,
}
