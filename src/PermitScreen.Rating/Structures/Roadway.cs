namespace PermitScreen.Rating.Structures;

/// <summary>The roadway in cross-section, from the structure's lateral datum.</summary>
/// <param name="LeftKerbM">Left kerb, m, positive to the right looking forward.</param>
/// <param name="RightKerbM">Right kerb, m, greater than the left one.</param>
/// <param name="LaneCount">Number of traffic lanes, ≥ 1; null where not said.</param>
/// <param name="AdttOneDirection">Trucks a day in one direction; null where unknown, which takes the highest factor (rule B2).</param>
public sealed record Roadway(double LeftKerbM, double RightKerbM, int? LaneCount, double? AdttOneDirection)
{
    /// <summary>Kerb to kerb, m.</summary>
    public double WidthM => RightKerbM - LeftKerbM;

    /// <summary>The roadway's centreline, m.</summary>
    public double CentreM => (LeftKerbM + RightKerbM) / 2;
}
