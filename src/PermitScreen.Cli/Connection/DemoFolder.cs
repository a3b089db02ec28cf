namespace PermitScreen.Cli.Connection;

/// <summary>Finds the demo: beside the program, in the folder where the user stands, or above either.</summary>
internal static class DemoFolder
{
    public const string PolicyName = "policies/ossel-demo";

    /// <summary>Civil date that the demo lives on.</summary>
    public static DateOnly Today { get; } = new(2026, 12, 1);

    public static string Find()
    {
        foreach (var start in new[] { Directory.GetCurrentDirectory(), AppContext.BaseDirectory })
        {
            for (var folder = new DirectoryInfo(start); folder is not null; folder = folder.Parent)
            {
                var demo = Path.Combine(folder.FullName, "deploy", "demo");
                if (Directory.Exists(Path.Combine(demo, "catalogue")))
                {
                    return demo;
                }
            }
        }

        throw new BadInputException("The demo's folder deploy/demo was not found; run this inside the repository, or name --catalogue and --policies.");
    }
}
