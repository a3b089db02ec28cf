using System.CommandLine;

namespace PermitScreen.Cli.Connection;

/// <summary>Options of commands that change records: who and why.</summary>
internal sealed class WritingOptions
{
    private readonly Option<string> _actor = new("--actor")
    {
        Description = "Who makes the change; kept with it. Your login name where left out.",
        DefaultValueFactory = _ => Environment.UserName,
    };

    private readonly Option<string?> _reason = new("--reason")
    {
        Description = "Why the change is made; needed, and kept with it.",
    };

    /// <summary>Adds who and why to a command.</summary>
    public void AddTo(Command command)
    {
        AddActorTo(command);
        command.Options.Add(_reason);
    }

    /// <summary>Adds who to a command that asks for no reason.</summary>
    public void AddActorTo(Command command) => command.Options.Add(_actor);

    /// <summary>Who.</summary>
    /// <exception cref="BadInputException">No name is given, and none is known.</exception>
    public Author Author(ParseResult parsed) => parsed.GetValue(_actor)?.Trim() is { Length: > 0 } actor
        ? new Author(actor)
        : throw new BadInputException("Say who makes the change with --actor NAME; it is kept with the change.");

    /// <summary>Why.</summary>
    /// <exception cref="BadInputException">No reason is given.</exception>
    public string Reason(ParseResult parsed) => parsed.GetValue(_reason)?.Trim() is { Length: > 0 } reason
        ? reason
        : throw new BadInputException("Say why the change is made with --reason \"...\"; it is kept with the change.");
}
