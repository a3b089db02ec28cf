using System.CommandLine;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Withdraws a policy document.</summary>
internal static class PolicyWithdrawCommand
{
    public static Command Create()
    {
        var change = new PolicyChange();
        var command = new Command("withdraw", "Withdraw a document; it stays in the records.");
        change.AddTo(command);
        command.SetAction((parsed, cancellation) => change.RunAsync(
            parsed,
            async (policies, c, options) =>
            {
                var request = new WithdrawPolicyRequest { Name = c.Name, Etag = c.Etag, RequestId = c.RequestId, ChangeReason = c.Reason };
                return (await policies.WithdrawPolicyAsync(request, options)).Policy;
            },
            cancellation));
        return command;
    }
}
