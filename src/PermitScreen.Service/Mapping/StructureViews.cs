using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Structures with less in them.</summary>
internal static class StructureViews
{
    /// <summary>Without geometry and effects; of each unit its id, chainage and kind.</summary>
    /// <param name="structure">Structure; changed in its place.</param>
    public static Structure Basic(Structure structure)
    {
        for (var u = 0; u < structure.Units.Count; u++)
        {
            var full = structure.Units[u];
            var basic = new Unit { UnitId = full.UnitId };
            if (full.HasStartChainageM)
            {
                basic.StartChainageM = full.StartChainageM;
            }

            switch (full.KindCase)
            {
                case Unit.KindOneofCase.Truss:
                    basic.Truss = new TrussUnit();
                    break;
                case Unit.KindOneofCase.Girder:
                    basic.Girder = new GirderUnit();
                    break;
                case Unit.KindOneofCase.FloorSystem:
                    basic.FloorSystem = new FloorSystem();
                    break;
                case Unit.KindOneofCase.RatedOnly:
                    basic.RatedOnly = new RatedOnlyUnit();
                    break;
                case Unit.KindOneofCase.GivenLines:
                    basic.GivenLines = new GivenLinesUnit();
                    break;
                default:
                    break;
            }

            structure.Units[u] = basic;
        }

        return structure;
    }
}
