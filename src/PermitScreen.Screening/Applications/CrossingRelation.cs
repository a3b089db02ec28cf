namespace PermitScreen.Screening.Applications;

/// <summary>Whether a vehicle goes over a structure or beneath it.</summary>
public enum CrossingRelation
{
    /// <summary>Over it: everything is checked.</summary>
    On = 1,

    /// <summary>Beneath it: height and width only.</summary>
    Under,
}
