using System.Reflection;

namespace PermitScreen.Tests.Shared;

/// <summary>Paths in the checkout that the tests were built from.</summary>
internal static class Repository
{
    public static string Root { get; } = typeof(Repository).Assembly
        .GetCustomAttributes<AssemblyMetadataAttribute>()
        .Single(a => a.Key == "RepositoryRoot").Value!;

    public static string Path(params string[] parts) => System.IO.Path.Combine([Root, .. parts]);
}
