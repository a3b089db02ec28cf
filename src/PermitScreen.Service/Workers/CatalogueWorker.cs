using Microsoft.Extensions.Diagnostics.HealthChecks;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Workers;

/// <summary>
/// Loads the catalogue into memory when the service starts, after taking in files where it was started on files. Calls that come before wait
/// within their deadline; the health service says when it is ready.
/// </summary>
internal sealed partial class CatalogueWorker : BackgroundService, IHealthCheck
{
    private static readonly TimeSpan BetweenReports = TimeSpan.FromSeconds(2);
    private readonly CatalogueSource _source;
    private readonly SourceImport _import;
    private readonly CurrentCatalogue _catalogue;
    private readonly CatalogueGate _gate;
    private readonly TimeProvider _time;
    private readonly IHostApplicationLifetime _lifetime;
    private readonly StartFailure _failure;
    private readonly ILogger<CatalogueWorker> _logger;

    /// <param name="source">Files to be taken in.</param>
    /// <param name="import">Takes them in.</param>
    /// <param name="catalogue">Catalogue to be loaded.</param>
    /// <param name="gate">Opened when it is.</param>
    /// <param name="time">Clock, for the log.</param>
    /// <param name="lifetime">Stopped where the catalogue cannot be read: a service without its catalogue must not look alive.</param>
    /// <param name="failure">Takes the reason.</param>
    /// <param name="logger">Log.</param>
    public CatalogueWorker(
        CatalogueSource source, SourceImport import, CurrentCatalogue catalogue, CatalogueGate gate, TimeProvider time, IHostApplicationLifetime lifetime, StartFailure failure, ILogger<CatalogueWorker> logger) =>
        (_source, _import, _catalogue, _gate, _time, _lifetime, _failure, _logger) = (source, import, catalogue, gate, time, lifetime, failure, logger);

    /// <inheritdoc/>
    public Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellationToken = default) =>
        Task.FromResult(_gate.Ready ? HealthCheckResult.Healthy("The catalogue is ready.") : HealthCheckResult.Unhealthy("The catalogue is being loaded."));

    /// <inheritdoc/>
    public override async Task StopAsync(CancellationToken cancellationToken)
    {
        await base.StopAsync(cancellationToken);
        if (_gate.Ready)
        {
            await _catalogue.StopAsync(cancellationToken);
        }
    }

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        await Task.Yield();
        var start = _time.GetTimestamp();
        var reported = start;
        LogProcessor(_logger, ProcessorWords.Text);
        try
        {
            if (_source.Any)
            {
                await _import.RunAsync(new Reporter(p => Report((p.Done, p.All), "Checking structures")), stoppingToken);
            }

            await _catalogue.LoadAsync(new Reading(n => Report((n, null), "Loading structures")), stoppingToken);
            var snapshot = await _catalogue.CurrentAsync(null, stoppingToken);
            _gate.Open();
            var elapsed = _time.GetElapsedTime(start);
            LogReady(_logger, snapshot.Count, snapshot.Policies.Count, snapshot.Version, elapsed);
        }
        catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
        {
            LogStopped(_logger);
        }
#pragma warning disable CA1031 // Whatever it is, calls that wait must be told, and a service without its catalogue must not look alive.
        catch (Exception error)
#pragma warning restore CA1031
        {
            _failure.Reason = error;
            _gate.Refuse(error);
            LogRefused(_logger, error.Message);
            _lifetime.StopApplication();
        }

        void Report((long Done, int? All) progress, string what)
        {
            if (_time.GetElapsedTime(reported) >= BetweenReports)
            {
                reported = _time.GetTimestamp();
                LogProgress(_logger, what, progress.Done, progress.All is { } all ? FormattableString.Invariant($" of {all}") : "");
            }
        }
    }

    [LoggerMessage(EventId = 1, Level = LogLevel.Information, Message = "Catalogue ready: {Structures} structures, {Policies} policy documents, version {Version}, in {Elapsed}")]
    private static partial void LogReady(ILogger logger, int structures, int policies, long version, TimeSpan elapsed);

    [LoggerMessage(EventId = 2, Level = LogLevel.Information, Message = "{What}: {Done}{OfAll}")]
    private static partial void LogProgress(ILogger logger, string what, long done, string ofAll);

    [LoggerMessage(EventId = 3, Level = LogLevel.Critical, Message = "The catalogue was refused. {Reason}")]
    private static partial void LogRefused(ILogger logger, string reason);

    [LoggerMessage(EventId = 4, Level = LogLevel.Information, Message = "Stopped while the catalogue was loaded")]
    private static partial void LogStopped(ILogger logger);

    [LoggerMessage(EventId = 5, Level = LogLevel.Information, Message = "Processor: {Words}")]
    private static partial void LogProcessor(ILogger logger, string words);

    private sealed class Reporter(Action<(int Done, int All)> report) : IProgress<(int Done, int All)>
    {
        public void Report((int Done, int All) value) => report(value);
    }

    private sealed class Reading(Action<long> report) : IProgress<long>
    {
        public void Report(long value) => report(value);
    }
}
