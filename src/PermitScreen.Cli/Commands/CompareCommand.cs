using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using Spectre.Console;

namespace PermitScreen.Cli.Commands;

/// <summary>Compares two revisions of a structure or policy document.</summary>
internal static class CompareCommand
{
    public static Command Create()
    {
        var name = new Argument<string>("name") { Description = "Structure or policy document, for instance P14-0032 or lrfr-permit-2013@1." };
        var before = new Option<long?>("--before") { Description = "Catalogue version of the one side; the revision before the other side's where left out." };
        var after = new Option<long?>("--after") { Description = "Catalogue version of the other side; the newest where left out." };
        var json = new Option<bool>("--json") { Description = "The whole answer as one JSON object, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("compare", "Compare two revisions of a structure or policy document, field by field.") { name, before, after, json };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var request = new CompareRevisionsRequest { Name = ResourceNames.Any(parsed.GetValue(name)!) };
            if (VersionOptions.Checked(before, parsed) is { } one)
            {
                request.BeforeVersion = one;
            }

            if (VersionOptions.Checked(after, parsed) is { } other)
            {
                request.AfterVersion = other;
            }

            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var answer = await connection.History.CompareRevisionsAsync(request, connection.Call(cancellation));
            if (parsed.GetValue(json))
            {
                JsonLines.Write(answer);
            }
            else
            {
                Print(request.Name, answer);
            }

            return ExitCodes.Passed;
        });
        return command;
    }

    private static void Print(string resource, CompareRevisionsResponse answer)
    {
        var console = Consoles.Create();
        console.WriteLine(resource);
        console.WriteLine($"  before  {Words(answer.Before)}");
        console.WriteLine($"  after   {Words(answer.After)}");
        if (answer.Differences.Count > 0)
        {
            var table = Tables.Create("Field", "Before", "After");
            foreach (var difference in answer.Differences)
            {
                table.AddTexts(difference.Field, difference.Before.Length > 0 ? difference.Before : "absent", difference.After.Length > 0 ? difference.After : "absent");
            }

            console.Write(table);
        }

        console.WriteLine($"{(answer.Differences.Count == 1 ? "1 field differs" : $"{Numbers.Count(answer.Differences.Count)} fields differ")}; the influence lines {(answer.LinesDiffer ? "differ" : "are the same")}.");
    }

    private static string Words(Revision? revision) => revision is null
        ? "not in the catalogue"
        : FormattableString.Invariant($"from version {revision.FromVersion}, {Numbers.Instant(revision.MadeAt)} UTC, {revision.Actor}: {revision.Reason} (etag {revision.Etag})");
}
