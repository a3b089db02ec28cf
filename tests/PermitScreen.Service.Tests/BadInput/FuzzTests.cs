using System.Globalization;
using Google.Protobuf;
using Grpc.Core;
using PermitScreen.Contracts.V1;
using PermitScreen.Rating.Checks;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>
/// Random fields of the demo's messages set to extreme values, from fixed seeds: never an internal error, never a rating factor that is no finite number, never a
/// pass with fewer rated effects than the catalogue lists.
/// </summary>
public sealed class FuzzTests(DemoService demo) : IClassFixture<DemoService>
{
    private const int OverTheWire = 300;
    private const int InMemory = 2_000;

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public async Task A_spoilt_application_never_ends_in_an_internal_error(int seed)
    {
        var random = new Random(seed);
        var application = DemoService.Request().Application;
        for (var i = 0; i < OverTheWire; i++)
        {
            var (spoilt, what) = Spoil(application, random);
            await Answered(what, async () =>
            {
                var request = DemoService.Request();
                request.Application = spoilt;
                await demo.Service.Screening.ScreenApplicationAsync(request);
            });
        }
    }

    [Theory]
    [InlineData(3)]
    [InlineData(4)]
    public async Task A_spoilt_structure_or_policy_never_ends_in_an_internal_error(int seed)
    {
        var random = new Random(seed);
        var structure = ContractFiles.Structures("deploy", "demo", "catalogue", "p14-0087.json")[0];
        var policy = ContractFiles.Policy("deploy", "policies", "lrfr-permit-2013.json");
        for (var i = 0; i < OverTheWire; i++)
        {
            var (spoilt, what) = Spoil(structure, random);
            await Answered(what, async () => await demo.Service.Catalogue.ValidateStructureAsync(new ValidateStructureRequest { Structure = spoilt }));
            var (changed, field) = Spoil(policy, random);
            await Answered(field, async () => await demo.Service.Policies.ValidatePolicyAsync(new ValidatePolicyRequest { Policy = changed }));
        }
    }

    [Theory]
    [InlineData(5, "01-pass-with-traffic")]
    [InlineData(6, "11-uplift-without-hold-down")]
    [InlineData(7, "17-interior-reaction")]
    [InlineData(8, "24-axle-with-lateral-offset")]
    public void What_passes_after_random_changes_still_rests_on_every_rated_effect(int seed, string name)
    {
        var random = new Random(seed);
        var (application, structures, policy) = ContractFiles.HandWorked(name);
        var screen = new InProcess(application, structures, policy, ContractFiles.HandWorkedDay);
        var rated = RatedEffects(screen.Screen());
        var (screened, passed) = (0, 0);
        for (var i = 0; i < InMemory; i++)
        {
            var (result, what) = random.Next(3) switch
            {
                0 => Screened(application, random, screen.With),
                1 => Screened(structures[0], random, s => screen.With(0, s)),
                _ => Screened(policy, random, screen.With),
            };
            if (result is null)
            {
                continue;
            }

            screened++;
            var infinite = result.Crossings.SelectMany(c => c.Ladder?.Rungs ?? []).SelectMany(r => r.Effects).FirstOrDefault(e => !IsFinite(e));
            Assert.True(infinite is null, $"{what}: RF {infinite?.RatingFactor}, k {infinite?.LargestAxleFactor}");
            if (result.Verdict.IsPass() && RatedEffects(result) is { } now)
            {
                passed++;
                Assert.True(now >= rated || result.Crossings[0].Basis == Screening.Crossings.AssessmentBasis.FitOnly, $"{what}: passes with {now} rated effects of {rated}");
            }
        }

        Figures.Note("fuzz/" + name, string.Create(CultureInfo.InvariantCulture, $"{InMemory} changes, {screened} screened, {passed} passed"));
        Assert.True(screened > 0);
    }

    private static bool IsFinite(Rating.Checks.EffectResult e) =>
        (e.RatingFactor is not { } rf || double.IsFinite(rf)) && (e.LargestAxleFactor is not { } k || double.IsFinite(k));

    private static int RatedEffects(RouteResult result) =>
        result.Crossings.Sum(c => c.Structure?.Rated?.Units.Sum(u => u.Effects.Length) ?? 0);

    private static (RouteResult? Result, string What) Screened<T>(T message, Random random, Func<T, RouteResult?> screen)
        where T : class, IMessage<T>
    {
        var (spoilt, what) = Spoil(message, random);
        return (screen(spoilt), what);
    }

    /// <summary>One to three random changes.</summary>
    private static (T Spoilt, string What) Spoil<T>(T message, Random random)
        where T : class, IMessage<T>
    {
        var what = new List<string>();
        for (var changes = random.Next(1, 4); changes > 0; changes--)
        {
            var fields = MessageFields.Set(message).ToList();
            var field = fields[random.Next(fields.Count)];
            var value = ExtremeValues.For(field.Field, random);
            message = value is null ? field.Cleared() : field.WithValue(value);
            what.Add($"{field.Path} = {value ?? "cleared"}");
        }

        return (message, string.Join("; ", what));
    }

    private static async Task Answered(string what, Func<Task> call)
    {
        try
        {
            await call();
        }
        catch (RpcException error)
        {
            Assert.True(error.StatusCode is StatusCode.InvalidArgument or StatusCode.NotFound or StatusCode.FailedPrecondition, $"{what}: {error.Status}");
        }
    }
}
