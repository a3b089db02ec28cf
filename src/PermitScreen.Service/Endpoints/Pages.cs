using System.Globalization;
using System.Text;
using PermitScreen.Service.Errors;

namespace PermitScreen.Service.Endpoints;

/// <summary>Pages of a list: a token holds the catalogue version of the first page, so that all pages show the same one, and the place where the next one begins.</summary>
internal static class Pages
{
    private const char Mark = ':';

    /// <summary>How many items a page has.</summary>
    public static int Size(bool hasSize, int size, int byDefault, int most)
    {
        if (hasSize && size < 0)
        {
            throw BadRequests.Of("page_size", FormattableString.Invariant($"Found {size}; allowed is 0 (the default of {byDefault}) to {most}; more counts as {most}."));
        }

        return !hasSize || size == 0 ? byDefault : Math.Min(size, most);
    }

    /// <summary>Version and place of a token; null for the first page.</summary>
    public static (long Version, string Place)? Read(string token)
    {
        if (token.Length == 0)
        {
            return null;
        }

        var bytes = new byte[token.Length];
        if (Convert.TryFromBase64String(token, bytes, out var length)
            && Encoding.UTF8.GetString(bytes, 0, length).Split(Mark, 2) is [var version, var place]
            && long.TryParse(version, NumberStyles.None, CultureInfo.InvariantCulture, out var number))
        {
            return (number, place);
        }

        throw NotOurs(token);
    }

    /// <summary>Version and index of a token; the given version and 0 for the first page.</summary>
    public static (long Version, int Start) ReadIndex(string token, long version, int total)
    {
        if (Read(token) is not { } read)
        {
            return (version, 0);
        }

        return int.TryParse(read.Place, NumberStyles.None, CultureInfo.InvariantCulture, out var start) && start <= total
            ? (read.Version, start)
            : throw NotOurs(token);
    }

    /// <summary>Token of a page that begins after a place.</summary>
    public static string Token(long version, string place) =>
        Convert.ToBase64String(Encoding.UTF8.GetBytes(string.Create(CultureInfo.InvariantCulture, $"{version}{Mark}{place}")));

    /// <summary>Token of the page after, by index; empty at the end.</summary>
    public static string Next(long version, int start, int count, int total) =>
        (long)start + count < total ? Token(version, (start + count).ToString(CultureInfo.InvariantCulture)) : "";

    private static Grpc.Core.RpcException NotOurs(string token) =>
        BadRequests.Of("page_token", $"\"{token}\" is no token of this list; give next_page_token of the answer before, or nothing for the first page.");
}
