namespace PermitScreen.Rating.Checks;

/// <summary>Why a verdict is what it is; for machines.</summary>
public enum ReasonCode
{
    /// <summary>A rated effect is overloaded on every rung that is available.</summary>
    Overloaded = 1,

    /// <summary>Dead load alone exceeds the capacity: suspect data.</summary>
    DeadLoadExceedsCapacity,

    /// <summary>The structure is closed.</summary>
    Closed,

    /// <summary>The structure is posted for load.</summary>
    Posted,

    /// <summary>Too high.</summary>
    Height,

    /// <summary>Too wide.</summary>
    Width,

    /// <summary>The vehicle does not fit between the kerbs.</summary>
    NoRoomOnRoadway,

    /// <summary>Something needed is absent.</summary>
    DataMissing,

    /// <summary>The engine does not model this yet.</summary>
    NotModelled,

    /// <summary>The structure is not in the catalogue.</summary>
    NotInCatalogue,

    /// <summary>Shored or temporary structure.</summary>
    Standing,

    /// <summary>Condition is poor.</summary>
    PoorCondition,

    /// <summary>The inspection is overdue.</summary>
    InspectionOverdue,

    /// <summary>No rung is available to this kind of permit.</summary>
    NoRungAvailable,

    /// <summary>No lane is left for other traffic beside the vehicle.</summary>
    NoLaneBeside,

    /// <summary>The resistances given are of another method, limit state or level.</summary>
    MethodMismatch,

    /// <summary>The influence lines are not ready yet.</summary>
    LinesPending,

    /// <summary>A rung's live-load factor is not for this kind of permit.</summary>
    NoFactorForPermitKind,
}
