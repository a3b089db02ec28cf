namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>A theory that runs the general finite element solver CalculiX (ccx). Skipped where it is not installed, unless PERMITSCREEN_REQUIRE_TOOLS=1.</summary>
[AttributeUsage(AttributeTargets.Method)]
internal sealed class NeedsCcxTheoryAttribute : TheoryAttribute
{
    public NeedsCcxTheoryAttribute()
    {
        if (Ccx.Path is null && Environment.GetEnvironmentVariable("PERMITSCREEN_REQUIRE_TOOLS") != "1")
        {
            Skip = "ccx is not installed (Debian package calculix-ccx)";
        }
    }
}
