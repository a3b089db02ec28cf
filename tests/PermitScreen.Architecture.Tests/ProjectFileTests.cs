using System.Xml.Linq;

namespace PermitScreen.Architecture.Tests;

/// <summary>Project files: a reference that nothing uses yet leaves no trace in an assembly, but is wrong all the same.</summary>
public sealed class ProjectFileTests
{
    private static readonly string Source = Repository.Path("src");

    public static TheoryData<string> Projects() => [.. Layers.ProjectReferences.Keys];

    public static TheoryData<string> Pure() => [.. Layers.PurePackages.Keys];

    [Fact]
    public void Every_project_has_its_place()
    {
        var found = Directory.EnumerateFiles(Source, "*.csproj", SearchOption.AllDirectories).Select(f => Path.GetFileNameWithoutExtension(f));
        Assert.Equal(Layers.ProjectReferences.Keys.Order(StringComparer.Ordinal), found.Order(StringComparer.Ordinal));
    }

    [Theory]
    [MemberData(nameof(Projects))]
    public void Project_references_are_exactly_those_of_the_design(string project) =>
        Assert.Equal(
            Layers.ProjectReferences[project].Order(StringComparer.Ordinal),
            Includes(project, "ProjectReference").Select(r => Path.GetFileNameWithoutExtension(r.Replace('\\', '/'))).Order(StringComparer.Ordinal));

    [Theory]
    [MemberData(nameof(Pure))]
    public void Pure_projects_have_no_packages_and_no_framework_but_those_listed(string project)
    {
        Assert.Equal(Layers.PurePackages[project], Includes(project, "PackageReference"));
        Assert.Empty(Includes(project, "FrameworkReference"));
        Assert.Empty(Includes(project, "Reference"));
    }

    private static IEnumerable<string> Includes(string project, string item) =>
        XDocument.Load(Path.Combine(Source, project, project + ".csproj")).Descendants(item).Select(r => (string)r.Attribute("Include")!);
}
