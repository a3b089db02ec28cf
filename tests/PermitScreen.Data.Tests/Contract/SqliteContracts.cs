using PermitScreen.Data.Tests.Support;

namespace PermitScreen.Data.Tests.Contract;

public sealed class SqliteCatalogueStoreTests : CatalogueStoreContract
{
    protected override Task<StoresUnderTest> OpenAsync() => SqliteStores.OpenAsync();
}

public sealed class SqliteImportStoreTests : ImportStoreContract
{
    protected override Task<StoresUnderTest> OpenAsync() => SqliteStores.OpenAsync();
}

public sealed class SqliteBacklogStoreTests : BacklogStoreContract
{
    protected override Task<StoresUnderTest> OpenAsync() => SqliteStores.OpenAsync();
}
