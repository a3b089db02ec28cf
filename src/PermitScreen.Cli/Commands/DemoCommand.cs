using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;

namespace PermitScreen.Cli.Commands;

/// <summary>Starts the service on the demo, screens its first application over gRPC, prints it, and leaves the service answering.</summary>
internal static class DemoCommand
{
    private const int DefaultPort = 5080;
    private static readonly TimeSpan Timeout = TimeSpan.FromSeconds(60);

    public static Command Create()
    {
        var port = new Option<int>("--port") { Description = "Port on the loopback address; 0 lets the system choose.", DefaultValueFactory = _ => DefaultPort };
        var once = new Option<bool>("--once") { Description = "End after printing, with the exit code of the screening, in place of leaving the service answering." };
        var command = new Command("demo", "Screen the demo's first application and leave the service answering.") { port, once };
        command.SetAction(async (parsed, cancellation) =>
        {
            var application = ApplicationInput.Read(Path.Combine(DemoFolder.Find(), "applications", "01-reactor-vessel-13-axles.json"));
            await using var connection = await ServiceConnection.StartAsync(ServiceConnection.SourceOf([], []), Ports.Checked(parsed.GetValue(port)), Timeout, cancellation);
            var asOf = new Google.Type.Date { Year = DemoFolder.Today.Year, Month = DemoFolder.Today.Month, Day = DemoFolder.Today.Day };
            var screening = await ScreenCommand.RunAsync(connection, application, DemoFolder.PolicyName, asOf, version: null, full: true, cancellation);
            new ScreeningPrinter(Consoles.Create(), screening, application.Title, arithmetic: true).Print();
            if (parsed.GetValue(once))
            {
                return ScreenCommand.ExitCode(screening);
            }

            var address = connection.Address.ToString().TrimEnd('/');
            Console.Out.WriteLine();
            Console.Out.WriteLine($"The service answers at {address} (gRPC, HTTP/2 without TLS, with reflection). In another terminal, for instance:");
            Console.Out.WriteLine($"  dotnet run --project src/PermitScreen.Cli -- screen deploy/demo/applications/02-transformer-19-axles.json --as-of 2026-12-01 --server {address}");
            Console.Out.WriteLine("Stop it with Ctrl-C.");
            await connection.WaitAsync(cancellation);
            return ExitCodes.Passed;
        });
        return command;
    }
}
