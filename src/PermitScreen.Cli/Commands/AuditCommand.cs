using System.CommandLine;
using System.Globalization;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Shows the audit log.</summary>
internal static class AuditCommand
{
    public static Command Create()
    {
        var most = MostOption.Create();
        var json = new Option<bool>("--json") { Description = "One JSON object a line, for scripts; with the whole hashes." };
        var service = new ServiceOptions();
        var command = new Command("audit", "Show the audit log, newest first; `verify` reads its chain of hashes.") { most, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var count = MostOption.Checked(most, parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var entries = await Listings.UpToAsync(
                async (size, token) =>
                {
                    var page = await connection.History.ListAuditEntriesAsync(new ListAuditEntriesRequest { PageSize = size, PageToken = token }, connection.Call(cancellation));
                    return ((IEnumerable<AuditEntry>)page.AuditEntries, page.NextPageToken);
                },
                count);
            if (parsed.GetValue(json))
            {
                JsonLines.Write(entries);
                return ExitCodes.Passed;
            }

            var table = Tables.Create(">Entry", "=When, UTC", "Who", "What", "To what", "Why", ">Version", "=Hash begins");
            foreach (var e in entries)
            {
                table.AddTexts(
                    e.Sequence.ToString(CultureInfo.InvariantCulture), Numbers.Instant(e.MadeAt), e.Actor, e.Action, e.Subject, e.Reason, Numbers.Version(e.HasVersion, e.Version), e.Hash[..Math.Min(12, e.Hash.Length)]);
            }

            Consoles.Create().Write(table);
            return ExitCodes.Passed;
        });
        return command;
    }
}
