using PermitScreen.Catalogue.Lines;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Lines;

/// <summary>
/// What the lines depend on, field by field: everything that goes into them changes their key, and nothing else of the whole contract does. A field
/// added to the contract fails here until it is said on which side it stands.
/// </summary>
public sealed class KeyEnumerationTests
{
    /// <summary>Seated on its abutments, continuous, of two units, with overhanging stringers; most ends are floor beams.</summary>
    private static readonly string[] Files = ["p14-0310.json", "p14-0236.json", "p14-0388.json", "p31-0118.json"];

    /// <summary>Fields on which lines depend.</summary>
    private static readonly string[] Decisive =
    [
        "permitscreen.v1.DeckEnd.kind",
        "permitscreen.v1.DeckEnd.tip_m",
        "permitscreen.v1.Structure.units",
        "permitscreen.v1.TrussDeck.end",
        "permitscreen.v1.TrussDeck.panel_points",
        "permitscreen.v1.TrussDeck.start",
        "permitscreen.v1.TrussMember.area_m2",
        "permitscreen.v1.TrussMember.elastic_modulus_mpa",
        "permitscreen.v1.TrussMember.end_node",
        "permitscreen.v1.TrussMember.start_node",
        "permitscreen.v1.TrussNode.x_m",
        "permitscreen.v1.TrussNode.y_m",
        "permitscreen.v1.TrussSupport.holds_horizontal",
        "permitscreen.v1.TrussSupport.holds_vertical",
        "permitscreen.v1.TrussSupport.node",
        "permitscreen.v1.TrussUnit.members",
        "permitscreen.v1.TrussUnit.supports",
        "permitscreen.v1.Unit.floor_system",
        "permitscreen.v1.Unit.girder",
        "permitscreen.v1.Unit.given_lines",
        "permitscreen.v1.Unit.rated_only",
        "permitscreen.v1.Unit.truss",
    ];

    /// <summary>
    /// Fields that cannot be changed alone: others refer to the name of a joint (<see cref="RenamingTests"/>), and no made-up deck fits (its fields are
    /// changed one by one).
    /// </summary>
    private static readonly string[] OnlyWithOthers = ["permitscreen.v1.TrussNode.name", "permitscreen.v1.TrussUnit.deck"];

    [Fact]
    public void Keys_change_with_what_lines_depend_on_and_with_nothing_else()
    {
        var touched = new Dictionary<string, int>(StringComparer.Ordinal);
        var changed = new Dictionary<string, int>(StringComparer.Ordinal);
        var same = new Dictionary<string, int>(StringComparer.Ordinal);
        var (all, refused) = (0, 0);
        var keys = new Dictionary<Structure, string?>(ReferenceEqualityComparer.Instance);
        foreach (var change in Bases().SelectMany((structure, i) => new FieldChanges(structure, i).All()))
        {
            all++;
            Count(touched, change);
            var before = keys.TryGetValue(change.Before, out var known) ? known : keys[change.Before] = Keys(change.Before);
            if (Keys(change.After) is not { } after || before is null)
            {
                refused++;
                continue;
            }

            if (before != after)
            {
                Count(changed, change);
                Assert.True(Decisive.Contains(change.Field.FullName), $"{change.What} {change.Field.FullName} changes the key.");
                Assert.False(change.What == "swap", $"The order of {change.Field.FullName} changes the key.");
            }
            else if (before.Length > 0)
            {
                // Where there is no truss there are no keys, and nothing is shown.
                Count(same, change);
            }
        }

        var fields = FieldChanges.Reachable().Select(f => f.FullName).ToList();
        AssertSame("Touched", fields, touched.Keys);
        AssertSame("Changed the key", Decisive, changed.Keys);
        AssertSame("Never changed alone", OnlyWithOthers, [.. fields.Except(Decisive).Except(same.Keys)]);
        Figures.Note("lines.key_enumeration[fields of the contract]", fields.Count);
        Figures.Note("lines.key_enumeration[fields that decide]", changed.Count);
        Figures.Note("lines.key_enumeration[changes]", all);
        Figures.Note("lines.key_enumeration[changes of the key]", changed.Values.Sum());
        Figures.Note("lines.key_enumeration[changes without change of the key]", same.Values.Sum());
        Figures.Note("lines.key_enumeration[changes refused]", refused);

        static void Count(Dictionary<string, int> counts, FieldChange change) =>
            counts[change.Field.FullName] = counts.GetValueOrDefault(change.Field.FullName) + 1;
    }

    private static void AssertSame(string what, IReadOnlyCollection<string> expected, IReadOnlyCollection<string> actual) => Assert.True(
        actual.ToHashSet(StringComparer.Ordinal).SetEquals(expected),
        $"{what}: missing {string.Join(", ", expected.Except(actual))}; too many {string.Join(", ", actual.Except(expected))}.");

    /// <summary>Structures as they are; without effects, where members and supports may be named anew; with one effect, which may be of another member.</summary>
    private static IEnumerable<Structure> Bases()
    {
        foreach (var file in Files)
        {
            var structure = ContractFiles.Structures("deploy", "demo", "catalogue", file).Single();
            yield return structure;
            if (file == Files[0])
            {
                yield return With(structure, u => u.Effects.Clear());
                yield return With(structure, u => KeepOne(u.Effects));
            }
        }

        static void KeepOne(IList<Effect> effects)
        {
            while (effects.Count > 1)
            {
                effects.RemoveAt(effects.Count - 1);
            }
        }

        static Structure With(Structure structure, Action<Unit> change)
        {
            var copy = structure.Clone();
            copy.State = StructureState.Posted;
            copy.PostedLimits.Add(new PostedLimit { GrossKn = 300, Sign = "30 t" });
            foreach (var unit in copy.Units)
            {
                change(unit);
            }

            return copy;
        }
    }

    private static string? Keys(Structure structure) => StructureMapper.Map(structure, new FaultList()) is { } record
        ? string.Join(' ', TrussKeys.Of(record).Select(k => k.ToString()).Order(StringComparer.Ordinal))
        : null;
}
