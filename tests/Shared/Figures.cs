using System.Globalization;
using System.Text;

namespace PermitScreen.Tests.Shared;

/// <summary>Hands out what checks measured (worst difference, number of cases), one line "key, tab, value" each, to the file named by PERMITSCREEN_FIGURES.</summary>
internal static class Figures
{
    private static readonly Lock Gate = new();

    internal static void Note(string key, double value) => Note(key, value.ToString("R", CultureInfo.InvariantCulture));

    internal static void Note(string key, string value)
    {
        var path = Environment.GetEnvironmentVariable("PERMITSCREEN_FIGURES");
        if (string.IsNullOrEmpty(path))
        {
            return;
        }

        var line = Encoding.UTF8.GetBytes($"{key}\t{value}\n");
        lock (Gate)
        {
            using var file = OpenAlone(path);
            file.Seek(0, SeekOrigin.End);
            file.Write(line);
        }
    }

    /// <summary>Waits for other test processes that write to the same file: the open itself is the lock between processes.</summary>
    private static FileStream OpenAlone(string path)
    {
        for (var attempt = 0; ; attempt++)
        {
            try
            {
                return new FileStream(path, FileMode.OpenOrCreate, FileAccess.Write, FileShare.None);
            }
            catch (IOException) when (attempt < 1000)
            {
                Thread.Sleep(5);
            }
        }
    }
}
