using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Shows which influence lines are still to be computed.</summary>
internal static class BacklogCommand
{
    private static readonly TimeSpan BetweenLooks = TimeSpan.FromSeconds(2);

    public static Command Create()
    {
        var watch = new Option<bool>("--watch") { Description = "Look again every two seconds until nothing is left to compute." };
        var json = new Option<bool>("--json") { Description = "One JSON object a look, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("backlog", "Show which influence lines are still to be computed. Exit code 1 where some cannot be.") { watch, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var printer = new BacklogPrinter(parsed.GetValue(json));
            var backlog = await ReadAsync(connection, cancellation);
            printer.Print(backlog);
            while (parsed.GetValue(watch) && !IsDone(backlog))
            {
                await Task.Delay(BetweenLooks, cancellation);
                backlog = await ReadAsync(connection, cancellation);
                printer.PrintNext(backlog);
            }

            printer.PrintFailures(backlog);
            return backlog.Failures.Count > 0 ? ExitCodes.NotPassed : ExitCodes.Passed;
        });
        return command;
    }

    private static async Task<Backlog> ReadAsync(ServiceConnection connection, CancellationToken cancellation) =>
        (await connection.Maintenance.GetBacklogAsync(new GetBacklogRequest(), connection.Call(cancellation))).Backlog;

    /// <summary>What cannot be computed stays pending for ever.</summary>
    private static bool IsDone(Backlog backlog) => backlog.PendingCount <= backlog.Failures.Count;
}
