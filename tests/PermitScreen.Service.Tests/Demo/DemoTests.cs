using System.Text.Json.Nodes;
using Google.Protobuf;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.Demo;

/// <summary>The demo against an oracle in another language (tests/oracle, Python, standard library only), which was written from the rules and not from this code.</summary>
public sealed class DemoTests
{
    private const double Tolerance = 1e-9;

    [Theory]
    [InlineData("01-reactor-vessel-13-axles.json")]
    [InlineData("02-transformer-19-axles.json")]
    [InlineData("03-excavator-9-axles.json")]
    [InlineData("04-timber-5-axles-annual.json")]
    public async Task Every_rung_agrees_with_the_oracle(string file)
    {
        await using var service = await RunningService.StartAsync([Repository.Path("deploy", "demo", "catalogue")], [Repository.Path("deploy", "demo", "policies")]);
        var faults = new FaultList();
        var application = FileSchemas.ReadApplication(await File.ReadAllTextAsync(Repository.Path("deploy", "demo", "applications", file)), faults);
        Assert.Empty(faults.All);
        var response = await service.Screening.ScreenApplicationAsync(new ScreenApplicationRequest
        {
            Application = application!.Application,
            Policy = "policies/ossel-demo",
            AsOfDate = new Google.Type.Date { Year = 2026, Month = 12, Day = 1 },
            View = ScreeningView.Full,
        });
        var written = JsonNode.Parse(JsonFormatter.Default.Format(response.Screening))!;
        var expected = JsonNode.Parse(await File.ReadAllTextAsync(Repository.Path("tests", "oracle", "demo_expected.json")))!["applications"]!.AsArray()
            .Single(a => (string?)a!["file"] == file)!;
        var misses = new List<string>();
        Same("verdict", "VERDICT_" + (string)expected["verdict"]!, (string?)written["verdict"], misses);
        var crossings = expected["crossings"]!.AsArray();
        Assert.Equal(crossings.Count, response.Screening.Crossings.Count);
        for (var i = 0; i < crossings.Count; i++)
        {
            Compare($"crossings[{i}]", crossings[i]!, written["crossings"]![i]!, misses);
        }

        Assert.True(misses.Count == 0, string.Join('\n', misses));
    }

    private static void Compare(string at, JsonNode expected, JsonNode found, List<string> misses)
    {
        Same($"{at}.verdict", "VERDICT_" + (string)expected["verdict"]!, (string?)found["verdict"], misses);
        Same($"{at}.rungId", (string?)expected["rungId"] ?? "", (string?)found["rungId"] ?? "", misses);
        var codes = (found["reasons"]?.AsArray() ?? []).Select(r => ((string)r!["code"]!)["REASON_CODE_".Length..]).Distinct().Order(StringComparer.Ordinal);
        Same($"{at}.reasons", string.Join(' ', expected["reasons"]!.AsArray().Select(r => (string)r!).Distinct().Order(StringComparer.Ordinal)), string.Join(' ', codes), misses);
        var rungs = expected["rungs"]?.AsArray() ?? [];
        for (var r = 0; r < rungs.Count; r++)
        {
            var rung = found["rungs"]![r]!;
            var by = rungs[r]!;
            Same($"{at}.rungs[{r}].outcome", "RUNG_OUTCOME_" + (string)by["outcome"]!, (string?)rung["outcome"], misses);
            Number($"{at}.rungs[{r}].ratingFactor", by["ratingFactor"], rung["ratingFactor"], misses);
            Number($"{at}.rungs[{r}].largestAxleFactor", by["largestAxleFactor"], rung["largestAxleFactor"], misses);
            var governing = by["governing"]?.AsArray() ?? [];
            if (governing.Count > 0)
            {
                var name = rung["governing"]?["effect"];
                var named = governing.Any(g =>
                    (string?)g!["effectId"] == (string?)name?["effectId"]
                    && (string?)g["planeId"] == (string?)name?["planeId"]
                    && (string?)g["sense"] == (string?)name?["sense"]);
                Same($"{at}.rungs[{r}].governing", "one of the oracle's", named ? "one of the oracle's" : name?.ToJsonString() ?? "none", misses);
            }
        }
    }

    private static void Number(string at, JsonNode? expected, JsonNode? found, List<string> misses)
    {
        var by = expected?.GetValue<double>();
        var value = found?.GetValue<double>();
        if (by.HasValue != value.HasValue || (by is { } b && Math.Abs(b - value!.Value) > Tolerance * Math.Max(1, Math.Abs(b))))
        {
            misses.Add($"{at}: oracle {by?.ToString("R", System.Globalization.CultureInfo.InvariantCulture) ?? "none"}, found {value?.ToString("R", System.Globalization.CultureInfo.InvariantCulture) ?? "none"}");
        }
    }

    private static void Same(string at, string? expected, string? found, List<string> misses)
    {
        if (expected != found)
        {
            misses.Add($"{at}: oracle {expected}, found {found}");
        }
    }
}
