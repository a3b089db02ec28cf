using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Shows change sets: the catalogue's versions.</summary>
internal static class ChangesCommand
{
    public static Command Create()
    {
        var most = MostOption.Create();
        var json = new Option<bool>("--json") { Description = "One JSON object a line, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("changes", "Show change sets, each of them one catalogue version, newest first.") { most, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var count = MostOption.Checked(most, parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var sets = await Listings.UpToAsync(
                async (size, token) =>
                {
                    var page = await connection.History.ListChangeSetsAsync(new ListChangeSetsRequest { PageSize = size, PageToken = token }, connection.Call(cancellation));
                    return ((IEnumerable<ChangeSet>)page.ChangeSets, page.NextPageToken);
                },
                count);
            if (parsed.GetValue(json))
            {
                JsonLines.Write(sets);
                return ExitCodes.Passed;
            }

            var table = Tables.Create(">Version", "=When, UTC", "Who", "What", "Why", ">Added", ">Revised", ">Removed");
            foreach (var s in sets)
            {
                table.AddTexts(
                    Numbers.Version(s.HasVersion, s.Version), Numbers.Instant(s.MadeAt), s.Actor, s.Action, s.Reason, Numbers.Count(s.AddedCount), Numbers.Count(s.RevisedCount), Numbers.Count(s.RemovedCount));
            }

            Consoles.Create().Write(table);
            return ExitCodes.Passed;
        });
        return command;
    }
}
