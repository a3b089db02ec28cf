using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Reads every record again.</summary>
internal static class VerifyCommand
{
    public static Command Create()
    {
        var knownHash = new Option<string>("--known-hash") { Description = "Hash of an audit entry that was noted down earlier; it must stand in the chain.", DefaultValueFactory = _ => "" };
        var json = new Option<bool>("--json") { Description = "One JSON object a message of the service, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("verify", "Read every record again: audit chain, revisions, pages, lines. Exit code 0 sound, 1 not sound.") { knownHash, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var request = new VerifyRecordsRequest { KnownHash = parsed.GetValue(knownHash)!.Trim() };
            var printer = new VerificationPrinter(parsed.GetValue(json));
            var messages = Streams.ReadAsync(
                token => connection.History.VerifyRecords(request, cancellationToken: token), connection.Patience, cancellation);
            await foreach (var message in messages)
            {
                printer.Print(message);
            }

            return printer.Finish() ? ExitCodes.Passed : ExitCodes.NotPassed;
        });
        return command;
    }
}
