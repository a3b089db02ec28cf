namespace PermitScreen.Mechanics.Faults;

/// <summary>One thing wrong with an input: where it stands, what was found, and how to mend it.</summary>
/// <param name="Path">Path of the field in the contract's spelling, for instance <c>units[0].truss.nodes[3].x_m</c>; empty for the whole input.</param>
/// <param name="Message">What was found and what is allowed, in a sentence an engineer can act on.</param>
public sealed record Fault(string Path, string Message)
{
    /// <inheritdoc/>
    public override string ToString() => Path.Length == 0 ? Message : $"{Path}: {Message}";
}
