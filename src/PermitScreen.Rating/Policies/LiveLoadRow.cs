using System.Collections.Immutable;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Policies;

/// <summary>A row of live-load factors for one kind of permit (rule B2).</summary>
/// <param name="RowId">Id within the policy.</param>
/// <param name="PermitKind">Kind of permit it is for.</param>
/// <param name="AdttOneDirection">Truck counts at which factors are given, ascending; empty where the factor holds at any.</param>
/// <param name="Classes">Classes of weight over length, ascending; the last one is open.</param>
public sealed record LiveLoadRow(string RowId, PermitKind PermitKind, ImmutableArray<double> AdttOneDirection, ImmutableArray<LiveLoadClass> Classes)
{
    /// <summary>Factor of one class at a truck count: linear between counts, constant outside, the largest where unknown.</summary>
    /// <param name="classIndex">Index into <see cref="Classes"/>.</param>
    /// <param name="adtt">Trucks a day in one direction; null where unknown.</param>
    public double FactorOf(int classIndex, double? adtt)
    {
        var factors = Classes[classIndex].Factors;
        if (AdttOneDirection.Length <= 1)
        {
            return factors[0];
        }

        if (adtt is not { } count)
        {
            return factors.Max();
        }

        if (count <= AdttOneDirection[0])
        {
            return factors[0];
        }

        for (var i = 1; i < AdttOneDirection.Length; i++)
        {
            if (count <= AdttOneDirection[i])
            {
                var share = (count - AdttOneDirection[i - 1]) / (AdttOneDirection[i] - AdttOneDirection[i - 1]);
                return factors[i - 1] + share * (factors[i] - factors[i - 1]);
            }
        }

        return factors[^1];
    }

    /// <summary>Index of the class that a weight over length falls into.</summary>
    /// <param name="knPerM">Gross weight over length, kN/m.</param>
    public int ClassOf(double knPerM)
    {
        for (var i = 0; i < Classes.Length - 1; i++)
        {
            if (knPerM <= Classes[i].UpToKnPerM)
            {
                return i;
            }
        }

        return Classes.Length - 1;
    }
}
