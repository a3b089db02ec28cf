using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Writes into a draft who confirmed its numbers.</summary>
internal static class PolicyConfirmCommand
{
    public static Command Create()
    {
        var person = new Option<string>("--person") { Description = "Who confirmed the numbers.", Required = true };
        var on = new Option<string>("--on") { Description = "Day of the confirmation, 2026-12-01.", Required = true };
        var reference = new Option<string>("--reference") { Description = "Reference of the decision.", Required = true };
        var change = new PolicyChange();
        var command = new Command("confirm", "Write into a draft who confirmed its numbers for the authority.") { person, on, reference };
        change.AddTo(command);
        command.SetAction((parsed, cancellation) =>
        {
            var confirmation = new PolicyConfirmation { Person = parsed.GetValue(person), ConfirmedOn = ApplicationInput.Date(parsed.GetValue(on)), Reference = parsed.GetValue(reference) };
            return change.RunAsync(
                parsed,
                async (policies, c, options) =>
                {
                    var request = new ConfirmPolicyRequest { Name = c.Name, Etag = c.Etag, RequestId = c.RequestId, ChangeReason = c.Reason, Confirmation = confirmation };
                    return (await policies.ConfirmPolicyAsync(request, options)).Policy;
                },
                cancellation);
        });
        return command;
    }
}
