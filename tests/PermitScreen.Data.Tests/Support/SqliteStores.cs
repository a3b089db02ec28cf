using PermitScreen.Data.Sqlite;

namespace PermitScreen.Data.Tests.Support;

/// <summary>Records in SQLite in a folder of their own.</summary>
internal static class SqliteStores
{
    public static Task<StoresUnderTest> OpenAsync()
    {
        var folder = Directory.CreateTempSubdirectory("permitscreen-data-").FullName;
        var records = SqliteRecords.Open(new SqliteSettings { Folder = folder, Temporary = true }, Samples.Start);
        return Task.FromResult(new StoresUnderTest(records.Catalogue, records.Imports, records.Backlog, records.Keeping, async () => await records.DisposeAsync()));
    }

    public static SqliteRecords Open(string folder, IStoreProbe? probe = null) =>
        SqliteRecords.Open(new SqliteSettings { Folder = folder, Probe = probe, BusyTimeout = TimeSpan.FromMilliseconds(100) }, Samples.Start);
}
