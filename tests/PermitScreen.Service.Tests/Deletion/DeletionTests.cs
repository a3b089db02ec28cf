using Google.Protobuf;
using PermitScreen.Contracts.V1;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Tests.Support;
using Verdict = PermitScreen.Rating.Checks.Verdict;

namespace PermitScreen.Service.Tests.Deletion;

/// <summary>
/// What is absent never counts in favour (engineering rule F4): every field that is set in a structure, an application or a
/// policy is deleted, one at a time, through the descriptors. Each deletion is refused, or the verdict is not better than before, no rung
/// passes that did not, and no rating factor of a rung that is still assessed as a whole is larger.
/// </summary>
public sealed class DeletionTests(DeletionCounts counts) : IClassFixture<DeletionCounts>
{
    public static TheoryData<string> HandWorkedCases() =>
        [.. Directory.EnumerateDirectories(Repository.Path("tests", "hand-worked")).Select(d => Path.GetFileName(d)).Order(StringComparer.Ordinal)];

    [Theory]
    [MemberData(nameof(HandWorkedCases))]
    public void Nothing_deleted_from_a_hand_worked_case_makes_a_verdict_better(string name)
    {
        var (application, structures, policy) = ContractFiles.HandWorked(name);
        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        Judge("hand-worked/" + name, screen, Enumerable.Range(0, structures.Count), ofApplication: true, ofPolicy: true);
    }

    [Theory]
    [InlineData("01-reactor-vessel-13-axles.json", false)]
    [InlineData("02-transformer-19-axles.json", false)]
    [InlineData("03-excavator-9-axles.json", true)]
    [InlineData("04-timber-5-axles-annual.json", true)]
    public void Nothing_deleted_from_a_demo_application_or_the_policy_makes_a_verdict_better(string file, bool ofPolicy)
    {
        var (application, structures, policy) = ContractFiles.Demo(file);
        Judge("demo/" + file, new InProcess(application, structures, policy, ContractFiles.DemoDay), [], ofApplication: true, ofPolicy);
    }

    [Theory]
    [InlineData("01-reactor-vessel-13-axles.json", "P14-0032", Verdict.Pass)]
    [InlineData("01-reactor-vessel-13-axles.json", "P14-0087", Verdict.PassWithConditions)]
    [InlineData("02-transformer-19-axles.json", "P31-0118", Verdict.PassWithConditions)]
    [InlineData("03-excavator-9-axles.json", "P31-0202", Verdict.Pass)]
    [InlineData("04-timber-5-axles-annual.json", "P31-0118", Verdict.Pass)]
    public void Nothing_deleted_from_a_demo_structure_makes_its_verdict_better(string file, string structure, Verdict verdict)
    {
        var (application, structures, policy) = ContractFiles.Demo(file);
        var only = OnlyOver(application, "structures/" + structure);
        var screen = new InProcess(only, [.. structures.Where(s => s.Name == "structures/" + structure)], policy, ContractFiles.DemoDay);
        Assert.Equal(verdict, screen.Screen().Verdict);
        Judge($"demo/{structure}", screen, [0], ofApplication: false, ofPolicy: false);
    }

    [Fact]
    public void A_weaker_resistance_marked_with_another_level_still_counts_where_the_method_knows_no_levels()
    {
        var (application, structures, policy) = ContractFiles.HandWorked("01-pass-with-traffic");
        var resistance = structures[0].Units[0].Effects.First(e => e.Rated is not null).Rated.Resistances[0];
        var splice = resistance.Clone();
        splice.Level = RatingLevel.Legal;
        splice.NominalKn /= 100;
        structures[0].Units[0].Effects.First(e => e.Rated is not null).Rated.Resistances.Add(splice);
        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        Assert.Equal(Verdict.Fail, screen.Screen().Verdict);
    }

    [Fact]
    public void A_policy_that_loses_its_level_does_not_drop_the_lower_of_two_resistances()
    {
        var (application, structures, policy) = ContractFiles.HandWorked("01-pass-with-traffic");
        foreach (var resistances in structures[0].Units[0].Effects.Where(e => e.Rated is not null).Select(e => e.Rated.Resistances))
        {
            var higher = resistances[0].Clone();
            higher.Level = RatingLevel.None;
            higher.NominalKn *= 2;
            resistances.Add(higher);
        }

        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        Assert.Equal(Verdict.Pass, screen.Screen().Verdict);
        Judge("two levels", screen, [0], ofApplication: false, ofPolicy: true);
    }

    /// <summary>The application with the first crossing of one structure, and the states that travel there.</summary>
    private static Application OnlyOver(Application application, string structure)
    {
        var only = application.Clone();
        var crossing = application.Route.CrossingList.Crossings.First(c => c.Structure == structure);
        only.Route.CrossingList.Crossings.Clear();
        only.Route.CrossingList.Crossings.Add(crossing);
        foreach (var state in application.Configurations.Where(c => c.LegIds.Count > 0 && !c.LegIds.Contains(crossing.LegId)))
        {
            only.Configurations.Remove(state);
        }

        return only;
    }

    private void Judge(string name, InProcess screen, IEnumerable<int> structures, bool ofApplication, bool ofPolicy)
    {
        var before = screen.Screen();
        var tally = new Tally(before, counts);
        foreach (var index in structures)
        {
            tally.Take("structures", screen.Structures[index], s => screen.With(index, s));
        }

        if (ofApplication)
        {
            tally.Take("application", screen.Application, screen.With);
        }

        if (ofPolicy)
        {
            tally.Take("policy", screen.Policy, screen.With);
        }

        Assert.True(tally.Deletions > 0, $"Nothing was deleted from {name}.");
        Assert.True(tally.Better.Count == 0, $"{name}: {tally.Better.Count} of {tally.Deletions} deletions improve:\n" + string.Join('\n', tally.Better.Take(30)));
    }

    /// <summary>Counts how deletions came out.</summary>
    private sealed class Tally(RouteResult before, DeletionCounts counts)
    {
        public int Deletions { get; private set; }

        public List<string> Better { get; } = [];

        public void Take<T>(string what, T message, Func<T, RouteResult?> screen)
            where T : class, IMessage<T>
        {
            foreach (var field in MessageFields.Set(message))
            {
                Deletions++;
                counts.Deletions++;
                if (screen(field.Cleared()) is not { } after)
                {
                    counts.Refused++;
                }
                else if (Betterment.Of(before, after) is { } better)
                {
                    counts.Better++;
                    Better.Add($"{what} {field.Path}: {better}");
                }
                else if (after.Crossings.Zip(before.Crossings).Any(c => c.First.Verdict == Verdict.NotAssessed && c.Second.Verdict != Verdict.NotAssessed))
                {
                    counts.NotAssessed++;
                }
            }
        }
    }
}
