using Google.Protobuf;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Files;
using PermitScreen.Service.Tests.Support;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>The demo served once for a class of tests, beside its policy a withdrawn, a dated and a confirmed copy, and the template policy.</summary>
public sealed class DemoService : IAsyncLifetime
{
    public const string Withdrawn = "policies/withdrawn";
    public const string Dated = "policies/dated";
    public const string Confirmed = "policies/confirmed";
    public const string Template = "policies/lrfr-permit-2013";
    public const string Demo = "policies/ossel-demo";

    private readonly string _folder = Directory.CreateTempSubdirectory("permitscreen-tests-").FullName;
    private RunningService? _service;

    public RunningService Service => _service ?? throw new InvalidOperationException("Not started.");

    /// <summary>A request that passes, to be spoilt.</summary>
    public static ScreenApplicationRequest Request()
    {
        var application = ContractFiles.Application("deploy", "demo", "applications", "01-reactor-vessel-13-axles.json");
        var crossing = application.Route.CrossingList.Crossings[0];
        application.Route.CrossingList.Crossings.Clear();
        application.Route.CrossingList.Crossings.Add(crossing);
        return new ScreenApplicationRequest
        {
            Application = application,
            Policy = Demo,
            AsOfDate = new Google.Type.Date { Year = 2026, Month = 12, Day = 1 },
        };
    }

    public async Task InitializeAsync()
    {
        Keep(Withdrawn, p => p.State = PolicyState.Withdrawn);
        Keep(Dated, p =>
        {
            p.State = PolicyState.InForce;
            p.InForceFrom = new Google.Type.Date { Year = 2027, Month = 1, Day = 1 };
            p.InForceTo = new Google.Type.Date { Year = 2027, Month = 12, Day = 31 };
        });
        Keep(Confirmed, p => p.Confirmation = new PolicyConfirmation
        {
            Person = "N. N.",
            ConfirmedOn = new Google.Type.Date { Year = 2026, Month = 5, Day = 4 },
            Reference = "example",
        });
        _service = await RunningService.StartAsync(
            [Repository.Path("deploy", "demo", "catalogue")],
            [Repository.Path("deploy", "demo", "policies"), Repository.Path("deploy", "policies"), _folder]);
    }

    public async Task DisposeAsync()
    {
        await Service.DisposeAsync();
        Directory.Delete(_folder, recursive: true);
    }

    private void Keep(string name, Action<Policy> change)
    {
        var policy = ContractFiles.Policy("deploy", "policies", "lrfr-permit-2013.json");
        policy.Name = name;
        change(policy);
        var file = new PolicyFile { Schema = FileSchemas.Policy, Policy = policy };
        File.WriteAllText(Path.Combine(_folder, name.Replace('/', '-') + ".json"), JsonFormatter.Default.Format(file));
    }
}
