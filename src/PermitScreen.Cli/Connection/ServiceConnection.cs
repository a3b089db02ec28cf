using System.CommandLine;
using Grpc.Core;
using Grpc.Net.Client;
using PermitScreen.Contracts.V1;
using PermitScreen.Host;
using PermitScreen.Service.Workers;

namespace PermitScreen.Cli.Connection;

/// <summary>A connection to a service that runs already, or to one that this command starts for itself.</summary>
internal sealed class ServiceConnection : IAsyncDisposable
{
    private const int LargestMessageBytes = 256 * 1024 * 1024;
    private readonly OwnService? _own;
    private readonly GrpcChannel _channel;

    private ServiceConnection(OwnService? own, Uri address, TimeSpan timeout)
    {
        _own = own;
        Patience = timeout;
        Address = address;
        _channel = GrpcChannel.ForAddress(address, new GrpcChannelOptions { MaxReceiveMessageSize = LargestMessageBytes });
    }

    public Uri Address { get; }

    /// <summary>Longest time to wait for an answer, or for a service that went away to come back.</summary>
    public TimeSpan Patience { get; }

    /// <summary>Whether the service is one of this command's own, which ends with it.</summary>
    public bool IsOwn => _own is not null;

    public ScreeningService.ScreeningServiceClient Screening => new(_channel);

    public CatalogueService.CatalogueServiceClient Catalogue => new(_channel);

    public PolicyService.PolicyServiceClient Policies => new(_channel);

    public ImportService.ImportServiceClient Imports => new(_channel);

    public HistoryService.HistoryServiceClient History => new(_channel);

    public MaintenanceService.MaintenanceServiceClient Maintenance => new(_channel);

    /// <summary>Opens what the options ask for.</summary>
    /// <param name="options">Options.</param>
    /// <param name="parsed">What the user wrote.</param>
    /// <param name="cancellation">Ends the wait.</param>
    /// <param name="needsCatalogue">Whether the command asks for structures; checking files does not.</param>
    public static async Task<ServiceConnection> OpenAsync(ServiceOptions options, ParseResult parsed, CancellationToken cancellation, bool needsCatalogue = true)
    {
        var seconds = parsed.GetValue(options.Timeout);
        if (seconds is not (> 0 and < 86400))
        {
            throw new BadInputException("--timeout is a number of seconds greater than 0 and below 86400.");
        }

        var timeout = TimeSpan.FromSeconds(seconds);
        var server = parsed.GetValue(options.Server);
        var data = parsed.GetValue(options.Data);
        var catalogue = options.RecordsOnly ? [] : parsed.GetValue(options.Catalogue) ?? [];
        var policies = options.RecordsOnly ? [] : parsed.GetValue(options.Policies) ?? [];
        if (server is not null)
        {
            if (data is not null || catalogue.Length > 0 || policies.Length > 0)
            {
                throw new BadInputException("--server names a running service, which has its own records; leave out --data, --catalogue and --policies.");
            }

            return Uri.TryCreate(server, UriKind.Absolute, out var address) && address.Scheme is "http" or "https"
                ? new ServiceConnection(null, address, timeout)
                : throw new BadInputException($"--server is an address such as http://127.0.0.1:5080; found \"{server}\".");
        }

        if (data is not null)
        {
            if (catalogue.Length > 0 || policies.Length > 0)
            {
                throw new BadInputException("--data names a folder of records, which come in by `import`; leave out --catalogue and --policies.");
            }

            return !options.MakesRecords && !Path.Exists(data)
                ? throw new BadInputException($"There is no folder {data}; `import` makes one and brings structures in.")
                : await StartAsync(new HostSettings { DataFolder = Folders.Checked("--data", data), Quiet = true }, timeout, cancellation);
        }

        if (options.RecordsOnly)
        {
            throw new BadInputException("Say which records: --data FOLDER for those in a folder, or --server ADDRESS for those of a running service.");
        }

        var source = needsCatalogue || catalogue.Length > 0
            ? SourceOf(catalogue, policies)
            : new CatalogueSource([], policies.Length > 0 ? policies : [Path.Combine(DemoFolder.Find(), "policies")]);
        return await StartAsync(source, 0, timeout, cancellation);
    }

    /// <summary>Starts a service of this process on files and waits until its catalogue is ready.</summary>
    public static Task<ServiceConnection> StartAsync(CatalogueSource source, int port, TimeSpan timeout, CancellationToken cancellation) =>
        StartAsync(new HostSettings { Source = source, Port = port, Quiet = true }, timeout, cancellation);

    /// <summary>What a command reads where the user names nothing: the demo.</summary>
    public static CatalogueSource SourceOf(string[] catalogue, string[] policies)
    {
        if (catalogue.Length == 0 && policies.Length == 0)
        {
            return new CatalogueSource([Path.Combine(DemoFolder.Find(), "catalogue")], [Path.Combine(DemoFolder.Find(), "policies")]);
        }

        // The demo's policy must not judge somebody's own bridges, nor somebody's policy the demo's, without being asked for.
        return (catalogue.Length, policies.Length) switch
        {
            ( > 0, 0) => throw new BadInputException("Name the policies too, for instance --policies deploy/policies; the demo's policy is for demo data only."),
            (0, > 0) => throw new BadInputException("Name the catalogue too, for instance --catalogue deploy/demo/catalogue."),
            _ => new CatalogueSource(catalogue, policies),
        };
    }

    /// <summary>Deadline and cancellation of a call.</summary>
    public CallOptions Call(CancellationToken cancellation) => Call(TimeSpan.Zero, cancellation);

    /// <summary>Deadline and cancellation of a call that may take longer than others.</summary>
    /// <param name="more">Added to the longest time to wait.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public CallOptions Call(TimeSpan more, CancellationToken cancellation) =>
        new(deadline: TimeProvider.System.GetUtcNow().UtcDateTime + Patience + more, cancellationToken: cancellation);

    /// <summary>A writing call, tried again where the connection is cut off: it must carry a request id, or be harmless to repeat.</summary>
    /// <param name="author">Who writes.</param>
    /// <param name="call">The call.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public Task<T> WriteAsync<T>(Author author, Func<CallOptions, AsyncUnaryCall<T>> call, CancellationToken cancellation) =>
        WriteAsync(author, o => call(o).ResponseAsync, cancellation);

    /// <inheritdoc cref="WriteAsync{T}(Author, Func{CallOptions, AsyncUnaryCall{T}}, CancellationToken)"/>
    public Task<T> WriteAsync<T>(Author author, Func<CallOptions, Task<T>> call, CancellationToken cancellation) =>
        Retries.CallAsync(() => call(Call(cancellation).WithHeaders(author.Metadata())), Patience, Console.Error.WriteLine, cancellation);

    /// <summary>Waits until the service of this process is stopped.</summary>
    public Task WaitAsync(CancellationToken cancellation) => _own?.WaitAsync(cancellation) ?? Task.CompletedTask;

    public async ValueTask DisposeAsync()
    {
        _channel.Dispose();
        if (_own is not null)
        {
            await _own.DisposeAsync();
        }
    }

    private static async Task<ServiceConnection> StartAsync(HostSettings settings, TimeSpan timeout, CancellationToken cancellation)
    {
        var own = await OwnService.StartAsync(settings, cancellation);
        return new ServiceConnection(own, own.Address, timeout);
    }
}
