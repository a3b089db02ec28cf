using System.CommandLine;
using System.Globalization;
using Google.Protobuf;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using Spectre.Console;

namespace PermitScreen.Cli.Commands;

/// <summary>Lists structures and policies.</summary>
internal static class ListCommand
{
    public static Command Create()
    {
        var asOfVersion = VersionOptions.AsOf();
        var json = new Option<bool>("--json") { Description = "One JSON object a line, for scripts: structures, without geometry and effects." };
        var service = new ServiceOptions();
        var command = new Command("list", "List the structures of the catalogue and the policy documents.") { asOfVersion, json };
        service.AddTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var version = VersionOptions.Checked(asOfVersion, parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var pages = Listings.StructuresAsync(connection, StructureView.Basic, Listings.LargestPage, version, cancellation);
            if (parsed.GetValue(json))
            {
                await foreach (var page in pages)
                {
                    foreach (var structure in page.Structures)
                    {
                        Console.Out.WriteLine(JsonFormatter.Default.Format(structure));
                    }
                }

                return ExitCodes.Passed;
            }

            var console = Consoles.Create();
            var (count, listed) = (0, version ?? 0);
            await foreach (var page in pages)
            {
                // A table a page: a catalogue of any size is printed as it comes.
                console.Write(TableOf(page.Structures));
                (count, listed) = (count + page.Structures.Count, page.CatalogueVersion);
            }

            var policies = await Listings.PoliciesAsync(connection, listed > 0 ? listed : null, cancellation);
            console.Write(TableOf(policies));
            console.WriteLine(FormattableString.Invariant($"{Numbers.Counted(count, "structure", "structures")} and {Numbers.Counted(policies.Count, "policy document", "policy documents")} of catalogue version {listed}"));
            return ExitCodes.Passed;
        });
        return command;
    }

    private static Table TableOf(IEnumerable<Structure> structures)
    {
        var table = Tables.Create("=Structure", "Title", "State", "Units", ">From version", "=Etag");
        foreach (var s in structures)
        {
            table.AddTexts(s.Name, s.Title, Numbers.Words(s.State), string.Join(", ", s.Units.Select(u => u.UnitId)), s.CatalogueVersion.ToString(CultureInfo.InvariantCulture), s.Etag);
        }

        return table;
    }

    private static Table TableOf(IEnumerable<Policy> policies)
    {
        var table = Tables.Create("=Policy", "Title", "State", "=In force", "Confirmed by", ">From version", "=Etag");
        foreach (var p in policies)
        {
            table.AddTexts(
                ResourceNames.Of(p), p.Title, Numbers.Words(p.State), PolicyWords.InForce(p), p.Confirmation?.Person ?? "nobody", p.CatalogueVersion.ToString(CultureInfo.InvariantCulture), p.Etag);
        }

        return table;
    }
}
