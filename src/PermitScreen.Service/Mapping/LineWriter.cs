using PermitScreen.Catalogue.Snapshots;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Writes influence lines for the contract.</summary>
internal static class LineWriter
{
    /// <summary>One line with its breakpoints.</summary>
    public static C.InfluenceLine Write(NamedLine named)
    {
        var line = named.Line;
        var written = new C.InfluenceLine
        {
            UnitId = named.UnitId,
            EffectId = named.EffectId,
            Description = named.Description,
            PositiveAreaM = line.PositiveArea,
            NegativeAreaM = line.NegativeArea,
        };
        for (var i = 0; i < line.Count; i++)
        {
            written.Points.Add(new C.LinePoint { ChainageM = line.XM[i], BeforePerKn = line.LeftOrdinates[i], AfterPerKn = line.RightOrdinates[i] });
        }

        return written;
    }
}
