using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>Looks up catalogue versions. Each change set names the version before it, so that a missing one is noticed; a restore passes over numbers.</summary>
internal static class VersionSearch
{
    private const string Table = "change_sets";

    /// <summary>The state at a version; null where there is no such version.</summary>
    /// <param name="database">Records.</param>
    /// <param name="newest">What is newest.</param>
    /// <param name="version">Catalogue version.</param>
    public static StateSum? FindState(Database database, VersionRow newest, long version)
    {
        if (version == 0)
        {
            return default(StateSum);
        }

        if (version < 0 || version > newest.Version)
        {
            return null;
        }

        if (ChangeSetRow.Find(database, version) is { } found)
        {
            return version == newest.Version && found.State != newest.State ? throw Missing(database, version, "its state is not that of the newest version") : found.State;
        }

        return ChangeSetRow.FirstAfter(database, version) is { } next && next.Previous < version ? null : throw Missing(database, version, "it is missing");
    }

    /// <summary>The state at a version that must be there.</summary>
    /// <param name="database">Records.</param>
    /// <param name="newest">What is newest.</param>
    /// <param name="version">Catalogue version.</param>
    /// <exception cref="StoreException">There is no such version.</exception>
    public static StateSum State(Database database, VersionRow newest, long version) => FindState(database, newest, version)
        ?? throw new StoreException(
            StoreTrouble.Other,
            FormattableString.Invariant($"There is no catalogue version {version} in these records; the newest is {newest.Version}. A restore passes over numbers: read the newest version anew."));

    /// <summary>Change sets, newest first, none left out.</summary>
    /// <param name="database">Records.</param>
    /// <param name="before">Only those below this version; null for all.</param>
    /// <param name="most">How many at most.</param>
    public static IReadOnlyList<ChangeSetHead> ChangeSets(Database database, long? before, int most)
    {
        var newest = VersionRow.Read(database).Version;
        var below = before is { } given && given <= newest ? given : newest + 1;
        var expected = below > newest ? newest : PreviousOf(database, below);
        var found = new List<ChangeSetHead>();
        foreach (var row in ChangeSetRow.Below(database, below, most))
        {
            if (row.Head.Version != expected)
            {
                throw Missing(database, expected, "it is missing");
            }

            found.Add(row.Head);
            expected = row.Previous;
        }

        return found.Count < most && expected > 0 ? throw Missing(database, expected, "it is missing") : found;
    }

    private static long PreviousOf(Database database, long version)
    {
        if (version <= 0)
        {
            return 0;
        }

        return ChangeSetRow.FirstAfter(database, version - 1) is { } next ? next.Previous : throw Missing(database, version, "every change set from it on is missing");
    }

    private static StoreException Missing(Database database, long version, string what) =>
        StoreErrors.Damaged(database.File, Table, FormattableString.Invariant($"version {version}"), what);
}
