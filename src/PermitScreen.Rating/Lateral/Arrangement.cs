using System.Collections.Immutable;

namespace PermitScreen.Rating.Lateral;

/// <summary>One way in which vehicles stand side by side.</summary>
/// <param name="PermitCentreM">Lateral position of the permit vehicle's centre, m.</param>
/// <param name="OtherCentresM">Lateral positions of the other vehicles' centres, m, from left to right.</param>
/// <param name="MultiplePresence">Multiple-presence factor on all of them.</param>
public sealed record Arrangement(double PermitCentreM, ImmutableArray<double> OtherCentresM, double MultiplePresence);
