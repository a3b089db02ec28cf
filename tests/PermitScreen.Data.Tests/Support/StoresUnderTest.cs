using PermitScreen.Catalogue.Storage;

namespace PermitScreen.Data.Tests.Support;

/// <summary>Empty stores of one kind, so that each kind passes the same tests.</summary>
public sealed record StoresUnderTest(ICatalogueStore Catalogue, IImportStore Imports, IBacklogStore Backlog, IRecordKeeping Keeping, Func<Task> Close) : IAsyncDisposable
{
    public async ValueTask DisposeAsync() => await Close();
}
