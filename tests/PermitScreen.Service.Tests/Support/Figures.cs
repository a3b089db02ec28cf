namespace PermitScreen.Service.Tests.Support;

/// <summary>Writes figures of checks to the file that PERMITSCREEN_FIGURES names, one line each, for tests/done.</summary>
public static class Figures
{
    private static readonly Lock Gate = new();

    public static void Write(string key, string value)
    {
        if (Environment.GetEnvironmentVariable("PERMITSCREEN_FIGURES") is { Length: > 0 } path)
        {
            lock (Gate)
            {
                File.AppendAllText(path, $"{key}\t{value}\n");
            }
        }
    }
}
