namespace PermitScreen.Architecture.Tests;

/// <summary>References of the built assemblies, as the compiler wrote them.</summary>
public sealed class AssemblyReferenceTests
{
    private static readonly string[] OutsidePure = ["Google.", "Grpc.", "Microsoft.AspNetCore", "Microsoft.Extensions", "Microsoft.Data", "SQLitePCL", "System.Net.Http", "System.Data"];

    public static TheoryData<string> Projects() => [.. Layers.ProjectReferences.Keys];

    public static TheoryData<string> Pure() => [.. Layers.PurePackages.Keys];

    [Theory]
    [MemberData(nameof(Projects))]
    public void References_go_one_way(string project)
    {
        var own = References(project).Where(IsOurs).Select(n => n == "permitscreen" ? "PermitScreen.Cli" : n);
        Assert.Empty(own.Except(Layers.Below(project)));
    }

    [Theory]
    [MemberData(nameof(Pure))]
    public void Pure_projects_know_no_wire_no_host_and_no_database(string project) =>
        Assert.DoesNotContain(References(project), n => OutsidePure.Any(o => n.StartsWith(o, StringComparison.Ordinal)));

    [Theory]
    [MemberData(nameof(Projects))]
    public void Only_the_mechanics_use_the_linear_algebra_library(string project) =>
        Assert.Equal(project == "PermitScreen.Mechanics", References(project).Any(n => n.StartsWith("MathNet", StringComparison.Ordinal)));

    [Theory]
    [MemberData(nameof(Projects))]
    public void The_contract_is_known_at_the_edge_only(string project) =>
        Assert.True(!References(project).Contains("PermitScreen.Contracts") || project is "PermitScreen.Service" or "PermitScreen.Host" or "PermitScreen.Cli");

    [Theory]
    [MemberData(nameof(Projects))]
    public void The_database_is_known_to_its_own_project_only(string project) =>
        Assert.Equal(project == "PermitScreen.Data.Sqlite", References(project).Any(n => n.StartsWith("Microsoft.Data.Sqlite", StringComparison.Ordinal)));

    [Fact]
    public void The_layers_do_use_each_other()
    {
        // Guards the tests above: assemblies without references would pass them all.
        Assert.Contains("PermitScreen.Mechanics", References("PermitScreen.Rating"));
        Assert.Contains("PermitScreen.Rating", References("PermitScreen.Catalogue"));
        Assert.Contains("PermitScreen.Catalogue", References("PermitScreen.Screening"));
        Assert.Contains("PermitScreen.Screening", References("PermitScreen.Service"));
        Assert.Contains("PermitScreen.Service", References("PermitScreen.Host"));
        Assert.Contains("PermitScreen.Host", References("PermitScreen.Cli"));
    }

    private static List<string> References(string project) =>
        [.. Layers.AssemblyOf(project).GetReferencedAssemblies().Select(a => a.Name!)];

    private static bool IsOurs(string name) => name.StartsWith("PermitScreen", StringComparison.OrdinalIgnoreCase);
}
