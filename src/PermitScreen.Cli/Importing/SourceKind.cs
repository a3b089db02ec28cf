namespace PermitScreen.Cli.Importing;

/// <summary>What a file of an import holds.</summary>
internal enum SourceKind
{
    /// <summary>Structures, or what cannot be told: then its faults are told as those of a catalogue file.</summary>
    Catalogue,

    /// <summary>One policy document.</summary>
    Policy,

    /// <summary>Something that an import passes over.</summary>
    Other,
}
