namespace PermitScreen.Screening.Crossings;

/// <summary>Basis of a verdict.</summary>
public enum AssessmentBasis
{
    /// <summary>Every rated member was checked.</summary>
    MemberCheck = 1,

    /// <summary>Height and width only.</summary>
    FitOnly,
}
