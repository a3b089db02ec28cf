using System.Globalization;
using System.Text.Json.Nodes;
using Google.Protobuf;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.HandWorked;

/// <summary>
/// The engine, through the whole path from files to gRPC, against verdicts worked by hand (tests/hand-worked/verdicts.txt),
/// which were written before the rating code. Each number agrees to 1e-6.
/// </summary>
public sealed class HandWorkedTests
{
    private const double Tolerance = 1e-6;
    private const double ZeroTolerance = 1e-9;
    private static readonly Google.Type.Date AsOf = new() { Year = 2026, Month = 9, Day = 1 };

    public static TheoryData<string> Cases() =>
        [.. Directory.EnumerateDirectories(Repository.Path("tests", "hand-worked")).Select(d => Path.GetFileName(d)).Order(StringComparer.Ordinal)];

    [Theory]
    [MemberData(nameof(Cases))]
    public async Task Verdict_agrees_with_the_hand_worked_one(string name)
    {
        var screening = await Screen(name);
        var written = JsonNode.Parse(JsonFormatter.Default.Format(screening))!;
        var expected = JsonNode.Parse(await File.ReadAllTextAsync(Repository.Path("tests", "hand-worked", name, "expected.json")))!;
        var misses = new List<string>();
        var worst = 0.0;
        var checks = expected["checks"]!.AsArray();
        foreach (var check in checks)
        {
            var path = (string)check!["path"]!;
            var found = JsonWalk.At(written, path);
            if (!Agrees(check["value"], found, ref worst))
            {
                misses.Add($"{path}: by hand {check["value"]?.ToJsonString() ?? "absent"}, found {found?.ToJsonString() ?? "absent"}");
            }
        }

        Figures.Note("hand-worked/" + name, string.Create(CultureInfo.InvariantCulture, $"{checks.Count} checks, {misses.Count} misses, worst {worst:0.0e+0}"));
        Assert.True(checks.Count > 0, "The case has no checks.");
        Assert.True(misses.Count == 0, $"{misses.Count} of {checks.Count} differ:\n" + string.Join('\n', misses.Take(20)));
    }

    private static async Task<Contracts.V1.Screening> Screen(string name)
    {
        var folder = Repository.Path("tests", "hand-worked", name);
        var variant = Path.Combine(folder, "policy.json");
        var policyFile = File.Exists(variant) ? variant : Repository.Path("deploy", "policies", "lrfr-permit-2013.json");
        await using var service = await RunningService.StartAsync([Path.Combine(folder, "catalogue.json")], [policyFile]);
        var faults = new FaultList();
        var application = FileSchemas.ReadApplication(await File.ReadAllTextAsync(Path.Combine(folder, "application.json")), faults);
        Assert.Empty(faults.All);
        var policies = await service.Policies.ListPoliciesAsync(new ListPoliciesRequest());
        var response = await service.Screening.ScreenApplicationAsync(new ScreenApplicationRequest
        {
            Application = application!.Application,
            Policy = policies.Policies[0].Name,
            AsOfDate = AsOf,
            View = ScreeningView.Full,
            NextEffects = 200,
        });
        return response.Screening;
    }

    private static bool Agrees(JsonNode? expected, JsonNode? found, ref double worst)
    {
        if (expected is null)
        {
            return found is null;
        }

        if (expected.GetValueKind() == System.Text.Json.JsonValueKind.String)
        {
            return (string?)found == (string?)expected || ((string?)expected == "" && found is null);
        }

        if (expected.GetValueKind() != System.Text.Json.JsonValueKind.Number)
        {
            return JsonNode.DeepEquals(expected, found);
        }

        if (found is null || found.GetValueKind() != System.Text.Json.JsonValueKind.Number)
        {
            return false;
        }

        var by = expected.GetValue<double>();
        var difference = Math.Abs(by - found.GetValue<double>());
        if (by == 0)
        {
            return difference <= ZeroTolerance;
        }

        worst = Math.Max(worst, difference / Math.Abs(by));
        return difference <= Tolerance * Math.Abs(by);
    }
}
