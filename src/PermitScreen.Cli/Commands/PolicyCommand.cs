using System.CommandLine;

namespace PermitScreen.Cli.Commands;

/// <summary>Changes policy documents: draft, confirmed, in force, withdrawn.</summary>
internal static class PolicyCommand
{
    public static Command Create() => new("policy", "Add, confirm, enact and withdraw policy documents; `list` shows them.")
    {
        PolicyAddCommand.Create(),
        PolicyConfirmCommand.Create(),
        PolicyEnactCommand.Create(),
        PolicyWithdrawCommand.Create(),
    };
}
