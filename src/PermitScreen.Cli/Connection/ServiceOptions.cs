using System.CommandLine;

namespace PermitScreen.Cli.Connection;

/// <summary>Options that say which service answers: one that runs already, or one of its own for this command.</summary>
internal sealed class ServiceOptions
{
    private const double DefaultTimeoutSeconds = 60;

    public Option<string?> Server { get; } = new("--server")
    {
        Description = "Address of a running service, for instance http://127.0.0.1:5080. Without it, a service of this command's own answers.",
    };

    public Option<string?> Data { get; } = new("--data")
    {
        Description = "Folder of records: a service of this command's own answers from them.",
    };

    public Option<string[]> Catalogue { get; } = new("--catalogue")
    {
        Description = "Files or folders of structures, kept for this command only; the demo's where no --server, --data or --catalogue is given.",
        AllowMultipleArgumentsPerToken = true,
    };

    public Option<string[]> Policies { get; } = new("--policies")
    {
        Description = "Files or folders of policies, kept for this command only; the demo's where no --server, --data or --policies is given.",
        AllowMultipleArgumentsPerToken = true,
    };

    public Option<double> Timeout { get; } = new("--timeout")
    {
        Description = "Longest time to wait for an answer, seconds.",
        DefaultValueFactory = _ => DefaultTimeoutSeconds,
    };

    /// <summary>Whether the command works on lasting records only, so that neither files nor the demo can stand in for them.</summary>
    public bool RecordsOnly { get; private set; }

    /// <summary>Whether the command makes a folder of records where there is none; a misspelt one must not pass for an empty catalogue.</summary>
    public bool MakesRecords { get; private set; }

    /// <summary>Adds the options to a command that only reads a catalogue.</summary>
    public void AddTo(Command command)
    {
        command.Options.Add(Server);
        command.Options.Add(Data);
        command.Options.Add(Catalogue);
        command.Options.Add(Policies);
        command.Options.Add(Timeout);
    }

    /// <summary>Adds the options to a command that changes or examines records: <c>--server</c> or <c>--data</c>.</summary>
    /// <param name="command">Command.</param>
    /// <param name="makes">Whether a folder that does not exist is made.</param>
    public void AddRecordsTo(Command command, bool makes = false)
    {
        (RecordsOnly, MakesRecords) = (true, makes);
        command.Options.Add(Server);
        command.Options.Add(Data);
        command.Options.Add(Timeout);
    }
}
