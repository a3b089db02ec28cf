namespace PermitScreen.Rating.Structures;

/// <summary>The rating method that a resistance or policy belongs to.</summary>
public enum RatingMethod
{
    /// <summary>Load and resistance factor rating.</summary>
    Lrfr,

    /// <summary>Load factor rating.</summary>
    Lfr,

    /// <summary>Allowable stress rating.</summary>
    AllowableStress,

    /// <summary>Partial factors after the Eurocodes.</summary>
    Eurocode,
}
