using System.CommandLine;
using Google.Protobuf;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Screens an application file.</summary>
internal static class ScreenCommand
{
    public static Command Create()
    {
        var file = new Argument<string>("file") { Description = "Application file (JSON)." };
        var policy = new Option<string?>("--policy") { Description = "Resource name of the policy; may be left out where the service has only one." };
        var asOf = new Option<string?>("--as-of") { Description = "Civil date for which standing and policy are read, 2026-12-01; today where left out." };
        var arithmetic = new Option<bool>("--arithmetic") { Description = "Print every rung and the arithmetic of the governing effect." };
        var json = new Option<bool>("--json") { Description = "Print the whole answer as JSON, for scripts." };
        var version = VersionOptions.AsOf();
        var service = new ServiceOptions();
        var command = new Command("screen", "Screen an application over its route.") { file, policy, asOf, version, arithmetic, json };
        service.AddTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var application = ApplicationInput.Read(parsed.GetValue(file)!);
            var date = ApplicationInput.Date(parsed.GetValue(asOf));
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var name = parsed.GetValue(policy) ?? await OnlyPolicyAsync(connection, cancellation);
            var full = parsed.GetValue(json) || parsed.GetValue(arithmetic);
            var screening = await RunAsync(connection, application, name, date, VersionOptions.Checked(version, parsed), full, cancellation);
            if (parsed.GetValue(json))
            {
                Console.Out.WriteLine(new JsonFormatter(JsonFormatter.Settings.Default.WithIndentation()).Format(screening));
            }
            else
            {
                new ScreeningPrinter(Consoles.Create(), screening, application.Title, parsed.GetValue(arithmetic)).Print();
            }

            return ExitCode(screening);
        });
        return command;
    }

    /// <summary>Screens over gRPC.</summary>
    public static async Task<Contracts.V1.Screening> RunAsync(
        ServiceConnection connection, Application application, string policy, Google.Type.Date? asOf, long? version, bool full, CancellationToken cancellation)
    {
        var request = new ScreenApplicationRequest
        {
            Application = application,
            Policy = policy,
            AsOfDate = asOf,
            View = full ? ScreeningView.Full : ScreeningView.Basic,
        };
        if (version is { } exact)
        {
            request.AsOfVersion = exact;
        }

        return (await connection.Screening.ScreenApplicationAsync(request, connection.Call(cancellation))).Screening;
    }

    /// <summary>Passed only where every crossing passes; a verdict that this program does not know is no pass.</summary>
    public static int ExitCode(Contracts.V1.Screening screening) =>
        screening.Verdict is Verdict.Pass or Verdict.PassWithConditions ? ExitCodes.Passed : ExitCodes.NotPassed;

    private static async Task<string> OnlyPolicyAsync(ServiceConnection connection, CancellationToken cancellation)
    {
        var documents = await Listings.PoliciesAsync(connection, null, cancellation);
        var names = documents.Select(ResourceNames.PolicyOf).Distinct().ToList();
        return names.Count switch
        {
            1 => names[0],
            0 => throw new BadInputException("There is no policy to screen under; add one with `policy add` or `import`."),
            _ => throw new BadInputException($"Name the policy with --policy; the service has {string.Join(", ", names)}."),
        };
    }
}
