namespace PermitScreen.Mechanics.Extremes;

/// <summary>Which way a vehicle drives over the structure.</summary>
public enum TravelDirection
{
    /// <summary>Towards higher chainage: axle i stands at lead − d_i.</summary>
    Forward,

    /// <summary>Towards lower chainage: axle i stands at lead + d_i.</summary>
    Reverse,
}
