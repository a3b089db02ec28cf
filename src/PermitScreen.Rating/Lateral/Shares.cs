using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Lateral;

/// <summary>Shares of two planes by the lever rule (rule C1; exact for any gauge, statics).</summary>
public static class Shares
{
    /// <summary>Share of a plane of the load at a lateral position; below 0 where the load stands beyond the other plane.</summary>
    /// <param name="unit">Unit with its two planes.</param>
    /// <param name="planeId">The plane asked for.</param>
    /// <param name="lateralM">Lateral position of the load, m.</param>
    public static double Of(RatedUnit unit, string planeId, double lateralM)
    {
        var spacing = unit.RightPlane.LateralM - unit.LeftPlane.LateralM;
        return planeId == unit.RightPlane.PlaneId
            ? (lateralM - unit.LeftPlane.LateralM) / spacing
            : (unit.RightPlane.LateralM - lateralM) / spacing;
    }

    /// <summary>By how much the share of a plane grows per metre to the right, 1/m.</summary>
    /// <param name="unit">Unit with its two planes.</param>
    /// <param name="planeId">The plane asked for.</param>
    public static double SlopePerM(RatedUnit unit, string planeId)
    {
        var spacing = unit.RightPlane.LateralM - unit.LeftPlane.LateralM;
        return planeId == unit.RightPlane.PlaneId ? 1 / spacing : -1 / spacing;
    }
}
