using System.CommandLine;
using System.Net;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using PermitScreen.Cli.Connection;
using PermitScreen.Host;
using PermitScreen.Service.Workers;

namespace PermitScreen.Cli.Commands;

/// <summary>Runs the service.</summary>
internal static class ServeCommand
{
    private const int DefaultPort = 5080;

    public static Command Create()
    {
        var data = new Option<string?>("--data") { Description = "Folder of records, made where it does not exist; fill it with `import`." };
        var catalogue = new Option<string[]>("--catalogue") { Description = "Files or folders of structures, kept while the service runs.", AllowMultipleArgumentsPerToken = true };
        var policies = new Option<string[]>("--policies") { Description = "Files or folders of policies, kept while the service runs.", AllowMultipleArgumentsPerToken = true };
        var address = new Option<string>("--address") { Description = "Address to listen on. Anything but the loopback address needs a proxy with TLS and sign-on before it.", DefaultValueFactory = _ => "127.0.0.1" };
        var port = new Option<int>("--port") { Description = "Port for gRPC (HTTP/2 without TLS).", DefaultValueFactory = _ => DefaultPort };
        var zone = new Option<string>("--zone") { Description = "The authority's time zone, for instance Europe/Lisbon; its civil date is the as-of date where a caller states none.", DefaultValueFactory = _ => "UTC" };
        var command = new Command("serve", "Run the service on the records in a folder, or on a catalogue and policies read from files.") { data, catalogue, policies, address, port, zone };
        command.SetAction(async (parsed, cancellation) =>
        {
            var settings = new HostSettings
            {
                Source = SourceOf(parsed.GetValue(data), parsed.GetValue(catalogue) ?? [], parsed.GetValue(policies) ?? []),
                DataFolder = parsed.GetValue(data) is { } folder ? Folders.Checked("--data", folder) : null,
                Address = IPAddress.TryParse(parsed.GetValue(address), out var ip) ? ip : throw new BadInputException($"--address is an IP address; found \"{parsed.GetValue(address)}\"."),
                Port = Ports.Checked(parsed.GetValue(port)),
                Zone = TimeZoneInfo.TryFindSystemTimeZoneById(parsed.GetValue(zone)!, out var found) ? found : throw new BadInputException($"There is no time zone \"{parsed.GetValue(zone)}\"; give a name such as Europe/Lisbon."),
            };
            await using var app = ServiceHost.Build(settings);
            try
            {
                await app.StartAsync(cancellation);
            }
            catch (IOException error) when (error.InnerException is Microsoft.AspNetCore.Connections.AddressInUseException)
            {
                throw new BadInputException(FormattableString.Invariant($"Port {settings.Port} is in use; give another one with --port."));
            }
            catch (OperationCanceledException) when (app.Services.GetRequiredService<StartFailure>().Reason is not null)
            {
                // The worker found the catalogue at fault, and stopped the host, before it had started.
                return ExitCodes.BadInput;
            }

            Console.Out.WriteLine($"Listening at {ServiceHost.AddressOf(app)} (gRPC, HTTP/2 without TLS). Stop with Ctrl-C.");
            await app.WaitForShutdownAsync(cancellation);
            return app.Services.GetRequiredService<StartFailure>().Reason is null ? ExitCodes.Passed : ExitCodes.BadInput;
        });
        return command;
    }

    private static CatalogueSource SourceOf(string? data, string[] catalogue, string[] policies) => (data, catalogue.Length, policies.Length) switch
    {
        (not null, 0, 0) => CatalogueSource.None,
        (not null, _, _) => throw new BadInputException("--data names a folder of records, which come in by `import`; leave out --catalogue and --policies."),
        (null, 0, 0) => throw new BadInputException("Say what to serve: --data FOLDER for the records in a folder, or --catalogue and --policies for files."),
        (null, > 0, 0) => throw new BadInputException("Name the policies too, for instance --policies deploy/policies."),
        (null, 0, > 0) => throw new BadInputException("Name the catalogue too, for instance --catalogue deploy/demo/catalogue."),
        _ => new CatalogueSource(catalogue, policies),
    };
}
