namespace PermitScreen.Rating.Policies;

/// <summary>Condition factor of one band of condition ratings.</summary>
/// <param name="FromRating">Lowest rating of the band.</param>
/// <param name="Factor">Factor.</param>
public sealed record ConditionFactor(int FromRating, double Factor);
