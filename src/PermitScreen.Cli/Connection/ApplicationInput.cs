using System.Globalization;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Connection;

/// <summary>Reads what the user names.</summary>
internal static class ApplicationInput
{
    /// <summary>The application of a file.</summary>
    public static Application Read(string path)
    {
        var text = File.Exists(path) ? File.ReadAllText(path) : throw new BadInputException(path.StartsWith("--", StringComparison.Ordinal) ? $"{path} is no option of this command, and no file." : $"There is no file {path}.");
        var faults = new FaultList();
        if (FileSchemas.ReadApplication(text, faults) is { Application: { } application })
        {
            return application;
        }

        if (!faults.Any)
        {
            faults.Add("application", "Missing; the file holds no application.");
        }

        throw new FileFaultsException([.. faults.All.Select(f => (path, f))]);
    }

    /// <summary>A civil date as people write it, 2026-12-01; null where none is given.</summary>
    public static Google.Type.Date? Date(string? text)
    {
        if (text is null)
        {
            return null;
        }

        return DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out var date)
            ? new Google.Type.Date { Year = date.Year, Month = date.Month, Day = date.Day }
            : throw new BadInputException($"Found \"{text}\"; a date is written as 2026-12-01.");
    }
}
