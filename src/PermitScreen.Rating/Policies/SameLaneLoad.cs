namespace PermitScreen.Rating.Policies;

/// <summary>Uniform load in the permit's own lane, without dynamic allowance (rule A5).</summary>
/// <param name="LoadKnPerM">Intensity, kN/m.</param>
/// <param name="ForSpansOverM">Applies where the longest span exceeds this, m.</param>
/// <param name="ForHoggingAndInteriorReactions">Applies to interior reactions, and to what spans on both sides of a pier load, of any span.</param>
public sealed record SameLaneLoad(double LoadKnPerM, double ForSpansOverM, bool ForHoggingAndInteriorReactions);
