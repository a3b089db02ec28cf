using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Deletes kept lines that nothing names any more.</summary>
internal static class CollectCommand
{
    public static Command Create()
    {
        var writing = new WritingOptions();
        var service = new ServiceOptions();
        var command = new Command("collect", "Delete kept influence lines that no retained revision, permit or job names any more.");
        writing.AddActorTo(command);
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var author = writing.Author(parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var answer = await connection.WriteAsync(author, o => connection.Maintenance.CollectLinesAsync(new CollectLinesRequest(), o), cancellation);
            Console.Out.WriteLine($"Influence lines of {Numbers.Counted(answer.DeletedCount, "truss", "trusses")} deleted, of {Numbers.Count(answer.KeptCount)} kept");
            return ExitCodes.Passed;
        });
        return command;
    }
}
