using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Mapping;

/// <summary>How large an input may be: far beyond what is met in practice, and small enough that one call cannot hold up the service.</summary>
internal static class Limits
{
    public const int Crossings = 10_000;
    public const int Configurations = 20;
    public const int Axles = 300;
    public const int Units = 100;
    public const int Nodes = 500;
    public const int Members = 2_000;
    public const int Supports = 200;
    public const int Planes = 20;
    public const int Effects = 5_000;
    public const int PerEffect = 50;
    public const int Restrictions = 200;
    public const int Rungs = 50;
    public const int Rows = 50;
    public const int Factors = 500;

    /// <summary>Farthest chainage or length, m.</summary>
    public const double ChainageM = 100_000;

    /// <summary>Longest vehicle, m.</summary>
    public const double VehicleM = 1_000;

    /// <summary>Farthest lateral position or height, m.</summary>
    public const double LateralM = 1_000;

    /// <summary>Adds a fault where a list is too long.</summary>
    /// <returns>Whether the list may be read.</returns>
    public static bool Within(this FaultList faults, string field, int count, int most)
    {
        if (count <= most)
        {
            return true;
        }

        faults.Add(field, FormattableString.Invariant($"Found {count}; allowed are at most {most}."));
        return false;
    }
}
