using System.Reflection;

namespace PermitScreen.Data.Sqlite.Schema;

/// <summary>The migrations of one kind of file, in order; the number of a migration is the schema version that it leads to.</summary>
/// <param name="Name">Name of the file that they are for.</param>
/// <param name="ApplicationId">Stands in the header of such a file, so that a foreign one is refused.</param>
/// <param name="Scripts">Scripts, each a list of statements.</param>
internal sealed record SchemaScripts(string Name, int ApplicationId, IReadOnlyList<IReadOnlyList<string>> Scripts)
{
    // "PSCR" and "PSLN" in ASCII; the scripts set the same numbers.
    private const int RecordsId = 0x50534352;
    private const int LinesId = 0x50534C4E;

    /// <summary>Those of the records.</summary>
    public static SchemaScripts Records { get; } = Load("records", RecordsId);

    /// <summary>Those of the lines.</summary>
    public static SchemaScripts Lines { get; } = Load("lines", LinesId);

    /// <summary>The newest schema version.</summary>
    public int Newest => Scripts.Count;

    private static SchemaScripts Load(string name, int applicationId)
    {
        var assembly = Assembly.GetExecutingAssembly();
        var scripts = assembly.GetManifestResourceNames()
            .Where(n => n.StartsWith(name + "-", StringComparison.Ordinal) && n.EndsWith(".sql", StringComparison.Ordinal))
            .Order(StringComparer.Ordinal)
            .Select(n => Split(Read(assembly, n)));
        return new SchemaScripts(name, applicationId, [.. scripts]);
    }

    private static string Read(Assembly assembly, string resource)
    {
        using var reader = new StreamReader(assembly.GetManifestResourceStream(resource)!);
        return reader.ReadToEnd();
    }

    /// <summary>Statements end with a semicolon at the end of a line; the scripts hold no triggers and no text that does.</summary>
    private static IReadOnlyList<string> Split(string script) =>
        [.. script.Split(";\n", StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries)];
}
