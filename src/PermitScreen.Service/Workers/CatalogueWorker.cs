using Microsoft.Extensions.Diagnostics.HealthChecks;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using PermitScreen.Catalogue.Lines;
using PermitScreen.Catalogue.Snapshots;

namespace PermitScreen.Service.Workers;

/// <summary>
/// Reads the catalogue when the service starts, computes and keeps the influence lines of every member of every structure,
/// and then publishes it. Calls that come before wait within their deadline; the health service says when it is ready.
/// </summary>
/// <param name="source">Where the catalogue is.</param>
/// <param name="lines">Lines known so far.</param>
/// <param name="shelf">Takes the structures.</param>
/// <param name="holder">Takes the snapshot.</param>
/// <param name="time">Clock, for the log.</param>
/// <param name="lifetime">Stopped where the catalogue cannot be read: a service without its catalogue must not look alive.</param>
/// <param name="failure">Takes the reason.</param>
/// <param name="logger">Log.</param>
public sealed partial class CatalogueWorker(
    CatalogueSource source,
    LineCache lines,
    StructureShelf shelf,
    CatalogueHolder holder,
    TimeProvider time,
    IHostApplicationLifetime lifetime,
    StartFailure failure,
    ILogger<CatalogueWorker> logger) : BackgroundService, IHealthCheck
{
    private static readonly TimeSpan BetweenReports = TimeSpan.FromSeconds(2);

    /// <inheritdoc/>
    public Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellationToken = default) =>
        Task.FromResult(holder.Ready ? HealthCheckResult.Healthy("The catalogue is ready.") : HealthCheckResult.Unhealthy("Influence lines are being computed."));

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        await Task.Yield();
        var start = time.GetTimestamp();
        var reported = start;
        try
        {
            var (snapshot, structures) = new CatalogueLoader(lines).Load(source.CataloguePaths, new Reporter(Report), stoppingToken);
            shelf.Fill(structures);
            holder.Publish(snapshot);
            var lineCount = snapshot.Structures.Values.Sum(s => s.Lines.Length);
            var elapsed = time.GetElapsedTime(start);
            LogReady(logger, structures.Count, lineCount, lines.Count, elapsed);
        }
        catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
        {
            LogStopped(logger);
        }
#pragma warning disable CA1031 // Whatever it is, calls that wait must be told, and a service without its catalogue must not look alive.
        catch (Exception error)
#pragma warning restore CA1031
        {
            failure.Reason = error;
            holder.Refuse(error);
            LogRefused(logger, error.Message);
            lifetime.StopApplication();
        }

        void Report((int Done, int All) progress)
        {
            if (time.GetElapsedTime(reported) >= BetweenReports)
            {
                reported = time.GetTimestamp();
                LogProgress(logger, progress.Done, progress.All);
            }
        }
    }

    [LoggerMessage(EventId = 1, Level = LogLevel.Information, Message = "Catalogue ready: {Structures} structures, {Lines} influence lines, {Trusses} different trusses solved, in {Elapsed}")]
    private static partial void LogReady(ILogger logger, int structures, int lines, int trusses, TimeSpan elapsed);

    [LoggerMessage(EventId = 2, Level = LogLevel.Information, Message = "Computing influence lines: {Done} of {All} structures")]
    private static partial void LogProgress(ILogger logger, int done, int all);

    [LoggerMessage(EventId = 3, Level = LogLevel.Critical, Message = "The catalogue was refused. {Reason}")]
    private static partial void LogRefused(ILogger logger, string reason);

    [LoggerMessage(EventId = 4, Level = LogLevel.Information, Message = "Stopped while influence lines were computed")]
    private static partial void LogStopped(ILogger logger);

    private sealed class Reporter(Action<(int Done, int All)> report) : IProgress<(int Done, int All)>
    {
        public void Report((int Done, int All) value) => report(value);
    }
}
