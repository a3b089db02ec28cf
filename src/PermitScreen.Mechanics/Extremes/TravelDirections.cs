namespace PermitScreen.Mechanics.Extremes;

/// <summary>The directions over which an extreme is sought.</summary>
[Flags]
public enum TravelDirections
{
    /// <summary>No direction: only the empty structure counts.</summary>
    None = 0,

    /// <summary>Towards higher chainage.</summary>
    Forward = 1,

    /// <summary>Towards lower chainage.</summary>
    Reverse = 2,

    /// <summary>Both directions.</summary>
    Both = Forward | Reverse,
}
