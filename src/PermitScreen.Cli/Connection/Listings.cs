using System.Runtime.CompilerServices;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Connection;

/// <summary>Listings that come in pages.</summary>
internal static class Listings
{
    /// <summary>Most items a page.</summary>
    public const int LargestPage = 1000;

    /// <summary>Structures, page by page; all pages show one catalogue version.</summary>
    /// <param name="connection">Connection.</param>
    /// <param name="view">How much of each.</param>
    /// <param name="pageSize">Structures a page.</param>
    /// <param name="asOfVersion">Catalogue version; null for the newest.</param>
    /// <param name="cancellation">Ends the reading.</param>
    public static async IAsyncEnumerable<ListStructuresResponse> StructuresAsync(
        ServiceConnection connection, StructureView view, int pageSize, long? asOfVersion, [EnumeratorCancellation] CancellationToken cancellation)
    {
        var request = new ListStructuresRequest { PageSize = pageSize, View = view };
        if (asOfVersion is { } version)
        {
            request.AsOfVersion = version;
        }

        do
        {
            var page = await connection.Catalogue.ListStructuresAsync(request, connection.Call(cancellation));
            yield return page;
            request.PageToken = page.NextPageToken;
        }
        while (request.PageToken.Length > 0);
    }

    /// <summary>All policy documents.</summary>
    public static async Task<IReadOnlyList<Policy>> PoliciesAsync(ServiceConnection connection, long? asOfVersion, CancellationToken cancellation)
    {
        var all = new List<Policy>();
        var request = new ListPoliciesRequest { PageSize = LargestPage };
        if (asOfVersion is { } version)
        {
            request.AsOfVersion = version;
        }

        do
        {
            var page = await connection.Policies.ListPoliciesAsync(request, connection.Call(cancellation));
            all.AddRange(page.Policies);
            request.PageToken = page.NextPageToken;
        }
        while (request.PageToken.Length > 0);
        return all;
    }

    /// <summary>Items of pages, up to a number.</summary>
    /// <param name="page">Reads a page of a size, by its token.</param>
    /// <param name="most">How many at most; null for all.</param>
    public static async Task<IReadOnlyList<T>> UpToAsync<T>(Func<int, string, Task<(IEnumerable<T> Items, string Next)>> page, int? most)
    {
        var all = new List<T>();
        var token = "";
        do
        {
            var (items, next) = await page(Math.Min(LargestPage, (most ?? int.MaxValue) - all.Count), token);
            all.AddRange(items);
            token = next;
        }
        while (token.Length > 0 && all.Count < (most ?? int.MaxValue));
        return all;
    }
}
