namespace PermitScreen.Rating.Checks;

/// <summary>Verdict, worst last: FAIL outranks NOT_ASSESSED, which outranks the passes (rule F1).</summary>
public enum Verdict
{
    /// <summary>Passes on the policy's first rung.</summary>
    Pass = 1,

    /// <summary>Passes under the travel conditions named.</summary>
    PassWithConditions,

    /// <summary>Could not be assessed; not passed.</summary>
    NotAssessed,

    /// <summary>Does not pass.</summary>
    Fail,
}
