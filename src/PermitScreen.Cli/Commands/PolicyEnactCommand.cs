using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Puts a confirmed draft in force.</summary>
internal static class PolicyEnactCommand
{
    public static Command Create()
    {
        var from = new Option<string>("--from") { Description = "First day in force, 2026-12-01.", Required = true };
        var to = new Option<string?>("--to") { Description = "Last day in force; until withdrawn where left out." };
        var change = new PolicyChange();
        var command = new Command("enact", "Put a confirmed draft in force.") { from, to };
        change.AddTo(command);
        command.SetAction((parsed, cancellation) =>
        {
            var (first, last) = (ApplicationInput.Date(parsed.GetValue(from)), ApplicationInput.Date(parsed.GetValue(to)));
            return change.RunAsync(
                parsed,
                async (policies, c, options) =>
                {
                    var request = new EnactPolicyRequest { Name = c.Name, Etag = c.Etag, RequestId = c.RequestId, ChangeReason = c.Reason, InForceFrom = first, InForceTo = last };
                    return (await policies.EnactPolicyAsync(request, options)).Policy;
                },
                cancellation);
        });
        return command;
    }
}
