using System.CommandLine;
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
        var json = new Option<bool>("--json") { Description = "One JSON object a line, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("list", "List the structures of the catalogue and the policies.") { json };
        service.AddTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, needsCatalogue: true, cancellation);
            var structures = await StructuresAsync(connection, cancellation);
            var policies = await connection.Policies.ListPoliciesAsync(new ListPoliciesRequest(), connection.Call(cancellation));
            if (parsed.GetValue(json))
            {
                foreach (var structure in structures)
                {
                    Console.Out.WriteLine(JsonFormatter.Default.Format(structure));
                }

                return ExitCodes.Passed;
            }

            var console = Consoles.Create();
            var table = new Table().Border(TableBorder.Simple);
            table.AddColumns("Structure", "Title", "State", "Units", "Etag");
            foreach (var s in structures)
            {
                table.AddRow(new Text(s.Name), new Text(s.Title), new Text(s.State.ToString()), new Text(string.Join(", ", s.Units.Select(u => u.UnitId))), new Text(s.Etag));
            }

            console.Write(table);
            var shelf = new Table().Border(TableBorder.Simple);
            shelf.AddColumns("Policy", "Title", "State", "Confirmed by");
            foreach (var p in policies.Policies)
            {
                shelf.AddRow(new Text(p.Name), new Text(p.Title), new Text(p.State.ToString()), new Text(p.Confirmation?.Person ?? "nobody"));
            }

            console.Write(shelf);
            return ExitCodes.Passed;
        });
        return command;
    }

    private static async Task<IReadOnlyList<Structure>> StructuresAsync(ServiceConnection connection, CancellationToken cancellation)
    {
        var all = new List<Structure>();
        var token = "";
        do
        {
            var page = await connection.Catalogue.ListStructuresAsync(new ListStructuresRequest { PageSize = 50, PageToken = token }, connection.Call(cancellation));
            all.AddRange(page.Structures);
            token = page.NextPageToken;
        }
        while (token.Length > 0);
        return all;
    }
}
