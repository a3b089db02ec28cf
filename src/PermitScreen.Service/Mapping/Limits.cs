using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Mapping;

/// <summary>How large an input may be: far beyond what is met in practice, and small enough that one call cannot hold up the service.</summary>
internal static class Limits
{
    public const int Crossings = 10_000;
    public const int Configurations = 20;
    public const int Axles = 300;
    public const int Units = 100;
    public const int Nodes = 2_000;
    public const int Members = 6_000;
    public const int Effects = 20_000;

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
