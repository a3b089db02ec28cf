using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using Spectre.Console;

namespace PermitScreen.Cli.Commands;

/// <summary>Shows the revisions of a structure or policy document.</summary>
internal static class HistoryCommand
{
    public static Command Create()
    {
        var name = new Argument<string>("name") { Description = "Structure or policy document, for instance P14-0032 or lrfr-permit-2013@1." };
        var json = new Option<bool>("--json") { Description = "One JSON object a line, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("history", "Show the revisions of a structure or policy document, newest first.") { name, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var resource = ResourceNames.Any(parsed.GetValue(name)!);
            var revisions = await Listings.UpToAsync(
                async (size, token) =>
                {
                    var page = await connection.History.ListRevisionsAsync(new ListRevisionsRequest { Parent = resource, PageSize = size, PageToken = token }, connection.Call(cancellation));
                    return ((IEnumerable<Revision>)page.Revisions, page.NextPageToken);
                },
                most: null);
            if (parsed.GetValue(json))
            {
                JsonLines.Write(revisions);
                return ExitCodes.Passed;
            }

            var table = Tables.Create(">From version", ">To version", "=When, UTC", "Who", "Why", "=Etag");
            foreach (var r in revisions)
            {
                table.AddTexts(Numbers.Version(r.HasFromVersion, r.FromVersion), r.HasToVersion ? Numbers.Version(true, r.ToVersion) : "newest", Numbers.Instant(r.MadeAt), r.Actor, r.Reason, r.Etag);
            }

            var console = Consoles.Create();
            console.WriteLine($"{resource}: {Numbers.Counted(revisions.Count, "revision", "revisions")}; each holds from its first version up to, and without, the version in the second column.");
            console.Write(table);
            return ExitCodes.Passed;
        });
        return command;
    }
}
