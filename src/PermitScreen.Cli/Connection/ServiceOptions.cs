using System.CommandLine;

namespace PermitScreen.Cli.Connection;

/// <summary>Options that say which service answers: one that runs already, or one of its own for this command.</summary>
internal sealed class ServiceOptions
{
    private const double DefaultTimeoutSeconds = 60;

    public Option<string?> Server { get; } = new("--server")
    {
        Description = "Address of a running service, for instance http://127.0.0.1:5080. Without it, a service of this command's own reads --catalogue and --policies.",
    };

    public Option<string[]> Catalogue { get; } = new("--catalogue")
    {
        Description = "Files or folders of structures; the demo's where neither this nor --server is given.",
        AllowMultipleArgumentsPerToken = true,
    };

    public Option<string[]> Policies { get; } = new("--policies")
    {
        Description = "Files or folders of policies; the demo's where neither this nor --server is given.",
        AllowMultipleArgumentsPerToken = true,
    };

    public Option<double> Timeout { get; } = new("--timeout")
    {
        Description = "Longest time to wait for an answer, seconds.",
        DefaultValueFactory = _ => DefaultTimeoutSeconds,
    };

    /// <summary>Adds the options to a command.</summary>
    public void AddTo(Command command)
    {
        command.Options.Add(Server);
        command.Options.Add(Catalogue);
        command.Options.Add(Policies);
        command.Options.Add(Timeout);
    }
}
