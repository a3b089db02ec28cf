using Microsoft.Extensions.DependencyInjection;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite;
using PermitScreen.Service;

namespace PermitScreen.Host;

/// <summary>Opens the records of one process and gives them to its services.</summary>
internal static class RecordsFolder
{
    /// <summary>Opens the folder of the settings, or a temporary one.</summary>
    /// <param name="settings">Settings.</param>
    /// <exception cref="StoreException">The records cannot be opened; the message says why and how to mend it.</exception>
    public static SqliteRecords Open(HostSettings settings)
    {
        var folder = settings.DataFolder ?? Directory.CreateTempSubdirectory("permitscreen-").FullName;
        return SqliteRecords.Open(
            new SqliteSettings { Folder = folder, Temporary = settings.DataFolder is null, Probe = HaltSwitch.FromEnvironment() },
            TimeProvider.System.GetUtcNow());
    }

    /// <summary>Registers the interfaces; the container closes the records last.</summary>
    /// <param name="services">Services of the host.</param>
    /// <param name="records">Records.</param>
    /// <param name="settings">Settings; records that are removed at the end leave no copy for the next start.</param>
    public static RecordsPlace Register(IServiceCollection services, SqliteRecords records, HostSettings settings)
    {
        services.AddSingleton(_ => records);
        services.AddSingleton(s => s.GetRequiredService<SqliteRecords>().Catalogue);
        services.AddSingleton(s => s.GetRequiredService<SqliteRecords>().Imports);
        services.AddSingleton(s => s.GetRequiredService<SqliteRecords>().Backlog);
        services.AddSingleton(s => s.GetRequiredService<SqliteRecords>().Lines);
        services.AddSingleton(s => s.GetRequiredService<SqliteRecords>().Keeping);
        return new RecordsPlace(Path.GetDirectoryName(records.SegmentPath)!, settings.DataFolder is null ? null : records.SegmentPath, () => records.LinesId, settings.DataFolder is null);
    }
}
