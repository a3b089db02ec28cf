using System.CommandLine;
using Grpc.Core;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Importing;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Imports structures and policies as one change set.</summary>
internal static class ImportCommand
{
    private const int DefaultItemsPerPiece = 200;

    public static Command Create()
    {
        var paths = new Argument<string[]>("path") { Description = "Catalogue and policy files, or folders of them.", Arity = ArgumentArity.OneOrMore };
        var allowPartial = new Option<bool>("--allow-partial") { Description = "Publish without the items that are refused, and list them; else nothing is published where any is." };
        var keep = new Option<bool>("--keep") { Description = "Keep an import that was not published, in place of giving it up." };
        var piece = new Option<int>("--piece") { Description = "Most items that are sent at once.", DefaultValueFactory = _ => DefaultItemsPerPiece };
        var json = new Option<bool>("--json") { Description = "One JSON object a line: each item refused, then the import." };
        var writing = new WritingOptions();
        var service = new ServiceOptions();
        var command = new Command("import", "Import structures and policies as one change set; broken off, the same command goes on where it was.") { paths, allowPartial, keep, piece, json };
        writing.AddTo(command);
        service.AddRecordsTo(command, makes: true);
        command.SetAction(async (parsed, cancellation) =>
        {
            var settings = new ImportSettings(
                writing.Author(parsed), writing.Reason(parsed), parsed.GetValue(allowPartial), Checked(parsed.GetValue(piece)), parsed.GetValue(keep));
            var files = SourceScan.Files(parsed.GetValue(paths)!);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            try
            {
                var source = await ProgressDisplay.RunAsync("Reading", "files read", files.Count, p => Task.FromResult(SourceScan.Read(files, p.Report, cancellation)));
                var printer = new ImportPrinter(parsed.GetValue(json));
                var run = new ImportRun(connection, source, settings, printer.Tell);
                var import = await run.RunAsync(cancellation);
                printer.Print(import, run.Refused);
                if (import.State == ImportState.Published && connection.IsOwn)
                {
                    await TellBacklogAsync(connection, printer, cancellation);
                }

                return import.State == ImportState.Published ? ExitCodes.Passed : ExitCodes.BadInput;
            }
            catch (Exception error) when (error is OperationCanceledException or RpcException && cancellation.IsCancellationRequested)
            {
                await Console.Error.WriteLineAsync($"Interrupted. Nothing is lost: what was sent is kept. Go on with:\n  {ShellWords.OfThisCommand()}");
                return ExitCodes.NoAnswer;
            }
            catch (RpcException error) when (Retries.IsCutOff(error) || error.StatusCode == StatusCode.DeadlineExceeded)
            {
                var code = await ErrorPrinter.PrintAsync(error);
                await Console.Error.WriteLineAsync($"Nothing is lost: what was sent is kept. Go on with:\n  {ShellWords.OfThisCommand()}");
                return code;
            }
        });
        return command;
    }

    private static int Checked(int piece) => piece is >= 1 and <= Pieces.MostItems
        ? piece
        : throw new BadInputException(FormattableString.Invariant($"--piece is a number from 1 to {Pieces.MostItems}; found {piece}."));

    /// <summary>The service ends with this command, perhaps before every line is computed.</summary>
    private static async Task TellBacklogAsync(ServiceConnection connection, ImportPrinter printer, CancellationToken cancellation)
    {
        var backlog = (await connection.Maintenance.GetBacklogAsync(new GetBacklogRequest(), connection.Call(cancellation))).Backlog;
        if (backlog.PendingCount > 0)
        {
            printer.Tell($"Influence lines of {Numbers.Counted(backlog.PendingCount, "truss", "trusses")} are still to be computed: the next service on these records does it, or `backlog --watch` with the same --data.");
        }
    }
}
