using System.CommandLine;
using Grpc.Core;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>What the commands that change a policy document have in common: name, who, why, and the etag that the change rests on.</summary>
internal sealed class PolicyChange
{
    private readonly Argument<string> _name = new("document") { Description = "Policy document, for instance policies/lrfr-permit-2013@1 or lrfr-permit-2013@1." };
    private readonly WritingOptions _writing = new();
    private readonly ServiceOptions _service = new();

    /// <summary>Adds what is common to a command.</summary>
    public void AddTo(Command command)
    {
        command.Arguments.Add(_name);
        _writing.AddTo(command);
        _service.AddRecordsTo(command);
    }

    /// <summary>Reads the document, changes it, prints what it is then.</summary>
    /// <param name="parsed">What the user wrote.</param>
    /// <param name="call">The change, of the document, resting on its etag, under a request id, for a reason.</param>
    /// <param name="cancellation">Ends the wait.</param>
    public async Task<int> RunAsync(ParseResult parsed, Func<PolicyService.PolicyServiceClient, Change, CallOptions, Task<Policy>> call, CancellationToken cancellation)
    {
        var name = ResourceNames.Document(parsed.GetValue(_name)!);
        var (reason, author) = (_writing.Reason(parsed), _writing.Author(parsed));
        await using var connection = await ServiceConnection.OpenAsync(_service, parsed, cancellation);
        var etag = (await connection.Policies.GetPolicyAsync(new GetPolicyRequest { Name = name }, connection.Call(cancellation))).Policy.Etag;
        var change = new Change(name, etag, Guid.NewGuid().ToString(), reason);
        Console.Out.WriteLine(PolicyWords.State(await connection.WriteAsync(author, o => call(connection.Policies, change, o), cancellation)));
        return ExitCodes.Passed;
    }

    /// <summary>A change of a document.</summary>
    internal sealed record Change(string Name, string Etag, string RequestId, string Reason);
}
