namespace PermitScreen.Rating.Checks;

/// <summary>Order of verdicts.</summary>
public static class Verdicts
{
    /// <summary>The worse of two verdicts (rule F1).</summary>
    /// <param name="one">One verdict.</param>
    /// <param name="other">Another verdict.</param>
    public static Verdict Worse(Verdict one, Verdict other) => one > other ? one : other;

    /// <summary>Whether a vehicle may cross under a verdict.</summary>
    /// <param name="verdict">The verdict.</param>
    public static bool IsPass(this Verdict verdict) => verdict is Verdict.Pass or Verdict.PassWithConditions;
}
