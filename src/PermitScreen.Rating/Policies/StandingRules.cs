namespace PermitScreen.Rating.Policies;

/// <summary>Fit and standing (rules F2, F3).</summary>
/// <param name="HeightMarginM">Margin taken off clear heights, m.</param>
/// <param name="WidthMarginM">Margin taken off clear widths, m.</param>
/// <param name="PoorUpToRating">Condition ratings up to this one count as poor.</param>
/// <param name="PoorCondition">What is done where the condition is poor.</param>
/// <param name="OverdueInspection">What is done where the inspection is overdue.</param>
public sealed record StandingRules(double HeightMarginM, double WidthMarginM, int PoorUpToRating, DoubtRule PoorCondition, DoubtRule OverdueInspection);
