using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Commands;

/// <summary>Adds a policy document as a draft.</summary>
internal static class PolicyAddCommand
{
    public static Command Create()
    {
        var file = new Argument<string>("file") { Description = "Policy file (JSON): a draft without confirmation, numbered after the newest document of its policy." };
        var writing = new WritingOptions();
        var service = new ServiceOptions();
        var command = new Command("add", "Add a policy document as a draft.") { file };
        writing.AddTo(command);
        service.AddRecordsTo(command, makes: true);
        command.SetAction(async (parsed, cancellation) =>
        {
            var request = new CreatePolicyRequest { Policy = Read(parsed.GetValue(file)!), RequestId = Guid.NewGuid().ToString(), ChangeReason = writing.Reason(parsed) };
            var author = writing.Author(parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var answer = await connection.WriteAsync(author, o => connection.Policies.CreatePolicyAsync(request, o), cancellation);
            Console.Out.WriteLine(PolicyWords.State(answer.Policy));
            return ExitCodes.Passed;
        });
        return command;
    }

    private static Policy Read(string path)
    {
        if (!File.Exists(path))
        {
            throw new BadInputException($"There is no file {path}.");
        }

        var faults = new FaultList();
        if (FileSchemas.ReadPolicy(File.ReadAllText(path), faults) is { Policy: { } policy })
        {
            return policy;
        }

        if (!faults.Any)
        {
            faults.Add("policy", "Missing; the file holds no policy.");
        }

        throw new FileFaultsException([.. faults.All.Select(f => (path, f))]);
    }
}
