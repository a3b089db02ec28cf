using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>
/// Keys and bytes of the demo's lines as they were when this version of the mechanics was settled. They guard the version and not the truth of the
/// lines, which other tests judge: whoever changes a bit of any line raises <see cref="TrussKey.MechanicsVersion"/> and puts a new file beside the old one.
/// </summary>
public sealed class GoldenLinesTests
{
    [Fact]
    public void Lines_are_those_of_this_version_of_the_mechanics_to_the_bit()
    {
        var path = Repository.Path("tests", "golden", $"lines-{TrussKey.MechanicsVersion}.txt");
        var now = ContractFiles.Structures("deploy", "demo", "catalogue").SelectMany(Rows).ToList();
        var text = string.Join('\n', now);
        Assert.True(File.Exists(path), $"There is no {path}. The lines of now, to be put there:\n{text}");
        var golden = File.ReadAllLines(path).Where(l => l.Length > 0 && l[0] != '#').ToList();
        Assert.True(
            golden.SequenceEqual(now, StringComparer.Ordinal),
            $"Lines differ from {path}. If that is meant, raise TrussKey.MechanicsVersion and keep these in a new file:\n{text}");
        Figures.Note("lines.golden[trusses]", golden.Count);
    }

    private static IEnumerable<string> Rows(Contracts.V1.Structure structure)
    {
        var record = StructureMapper.Map(structure, new FaultList())!;
        foreach (var unit in record.Units)
        {
            var (key, blob) = new LineLibrary().Compute(unit.Truss!, new FaultList())!.Value;
            yield return $"{record.Name}\t{unit.UnitId}\t{key}\t{Digest.Of(blob)}";
        }
    }
}
