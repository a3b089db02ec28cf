using System.Reflection;

namespace PermitScreen.Architecture.Tests;

/// <summary>The projects of the product and what each may know of (design, section 10).</summary>
internal static class Layers
{
    /// <summary>Project references, exactly: a wrong one fails even where nothing uses it.</summary>
    public static IReadOnlyDictionary<string, string[]> ProjectReferences { get; } = new Dictionary<string, string[]>(StringComparer.Ordinal)
    {
        ["PermitScreen.Mechanics"] = [],
        ["PermitScreen.Rating"] = ["PermitScreen.Mechanics"],
        ["PermitScreen.Catalogue"] = ["PermitScreen.Rating"],
        ["PermitScreen.Screening"] = ["PermitScreen.Catalogue"],
        ["PermitScreen.Contracts"] = [],
        ["PermitScreen.Service"] = ["PermitScreen.Contracts", "PermitScreen.Screening"],
        ["PermitScreen.Data.Sqlite"] = ["PermitScreen.Catalogue"],
        ["PermitScreen.Host"] = ["PermitScreen.Data.Sqlite", "PermitScreen.Service"],
        ["PermitScreen.Cli"] = ["PermitScreen.Contracts", "PermitScreen.Host"],
    };

    /// <summary>Projects without database, network or contract, and the only packages they may have.</summary>
    public static IReadOnlyDictionary<string, string[]> PurePackages { get; } = new Dictionary<string, string[]>(StringComparer.Ordinal)
    {
        ["PermitScreen.Mechanics"] = ["MathNet.Numerics"],
        ["PermitScreen.Rating"] = [],
        ["PermitScreen.Catalogue"] = [],
        ["PermitScreen.Screening"] = [],
    };

    /// <summary>The built assembly of a project.</summary>
    public static Assembly AssemblyOf(string project) =>
        Assembly.Load(project == "PermitScreen.Cli" ? "permitscreen" : project);

    /// <summary>Everything a project may know of: what it references, and what that references in turn.</summary>
    public static HashSet<string> Below(string project)
    {
        var below = new HashSet<string>(StringComparer.Ordinal);
        foreach (var reference in ProjectReferences[project])
        {
            below.Add(reference);
            below.UnionWith(Below(reference));
        }

        return below;
    }
}
