using System.Reflection;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Files of the repository that tests read.</summary>
internal static class Repository
{
    private static readonly string Root = typeof(Repository).Assembly.GetCustomAttributes<AssemblyMetadataAttribute>()
        .Single(attribute => attribute.Key == "RepositoryRoot").Value!;

    internal static string Reference(string file) => Path.Combine(Root, "tests", "reference", file);
}
