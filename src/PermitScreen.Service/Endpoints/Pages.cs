using System.Globalization;
using PermitScreen.Service.Errors;

namespace PermitScreen.Service.Endpoints;

/// <summary>Pages of a list that does not change while the service runs: a token is the number of items already given.</summary>
internal static class Pages
{
    /// <summary>Where a page begins and how many items it has.</summary>
    public static (int Start, int Count) Read(bool hasSize, int size, string token, int byDefault, int most, int total)
    {
        if (hasSize && size < 0)
        {
            throw BadRequests.Of("page_size", FormattableString.Invariant($"Found {size}; allowed is 0 (the default of {byDefault}) to {most}; more counts as {most}."));
        }

        var start = 0;
        if (token.Length > 0 && (!int.TryParse(token, NumberStyles.None, CultureInfo.InvariantCulture, out start) || start > total))
        {
            throw BadRequests.Of("page_token", $"\"{token}\" is no token of this list; give next_page_token of the answer before, or nothing for the first page.");
        }

        return (start, !hasSize || size == 0 ? byDefault : Math.Min(size, most));
    }

    /// <summary>Token of the page after; empty at the end.</summary>
    public static string Next(int start, int count, int total) =>
        start + count < total ? (start + count).ToString(CultureInfo.InvariantCulture) : "";
}
