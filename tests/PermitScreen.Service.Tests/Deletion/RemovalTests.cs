using System.Collections;
using PermitScreen.Contracts.V1;
using PermitScreen.Rating.Checks;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Deletion;

/// <summary>
/// Whole entries taken out of the lists of a truss unit that passes: an effect, a plane of an effect, a member, a support, a joint, a panel
/// point, a plane. Everything is rated or said not to be (engineering rule D6), so what is left is refused or not passed.
/// </summary>
public sealed class RemovalTests
{
    [Theory]
    [InlineData("01-pass-with-traffic", true)]
    [InlineData("04-passes-at-crawl", true)]
    [InlineData("09-section-loss-in-one-plane", true)]
    [InlineData("10-off-centre-roadway", true)]
    [InlineData("11-uplift-without-hold-down", false)]
    [InlineData("12-other-lanes-govern", true)]
    [InlineData("17-interior-reaction", true)]
    [InlineData("29-overhanging-end-stringers", false)]
    public void A_unit_without_one_of_its_entries_is_not_passed(string name, bool deckEndsAtBearings)
    {
        var (application, structures, policy) = ContractFiles.HandWorked(name);
        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        Assert.True(screen.Screen().Verdict.IsPass());
        var removals = 0;
        foreach (var (what, without) in structures[0].Units.SelectMany((_, u) => Without(structures[0], u, deckEndsAtBearings)))
        {
            removals++;
            Assert.True(screen.With(0, without) is not { } result || !result.Verdict.IsPass(), $"Passes without {what}.");
        }

        Assert.True(removals > 20, "Nothing was taken out.");
    }

    private static IEnumerable<(string What, Structure Without)> Without(Structure structure, int unit, bool deckEndsAtBearings)
    {
        var lists = new (string Name, Func<Unit, IList> Of)[]
        {
            ("effects", u => u.Effects),
            ("members", u => u.Truss.Members),
            ("supports", u => u.Truss.Supports),
            ("nodes", u => u.Truss.Nodes),
            ("panel_points", u => u.Truss.Deck.PanelPoints),
            ("planes", u => u.Truss.Planes),
        };
        foreach (var (name, of) in lists.Concat(structure.Units[unit].Effects.Select((e, i) => ($"effects[{i}].plane_ids", (Func<Unit, IList>)(u => u.Effects[i].PlaneIds)))))
        {
            for (var i = 0; i < of(structure.Units[unit]).Count; i++)
            {
                if (name == "panel_points" && !deckEndsAtBearings && (i == 0 || i == of(structure.Units[unit]).Count - 1))
                {
                    // Without its last floor beam an overhang is another deck, and a possible one.
                    continue;
                }

                var copy = structure.Clone();
                of(copy.Units[unit]).RemoveAt(i);
                yield return (FormattableString.Invariant($"units[{unit}].{name}[{i}]"), copy);
            }
        }
    }
}
