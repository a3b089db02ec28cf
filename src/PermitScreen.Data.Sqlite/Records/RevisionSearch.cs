using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>
/// Looks up revisions of one resource. A revision that is found proves itself by its checksum, since its interval is part of the row. That there is
/// none is believed only where all revisions of the resource are there as their second witness, the table resources, has them: a damaged page
/// can hide a row, but not in both.
/// </summary>
internal static class RevisionSearch
{
    /// <summary>The revision that holds at a version; null where there is none.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    /// <param name="version">Catalogue version.</param>
    public static RevisionHead? Find(Database database, ResourceKind kind, string name, long version)
    {
        if (RevisionRow.FindBegun(database, kind, name, version) is { } begun && begun.HoldsAt(version))
        {
            return begun;
        }

        History(database, kind, name);
        return null;
    }

    /// <summary>What is known of a resource, and its newest revision where one holds.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    public static (ResourceRow? Known, RevisionHead? Newest) Newest(Database database, ResourceKind kind, string name)
    {
        if (ResourceRow.Find(database, kind, name) is not { } known)
        {
            return (null, null);
        }

        if (known.NewestTo is not null)
        {
            return (known, null);
        }

        var newest = RevisionRow.FindBegun(database, kind, name, known.NewestFrom);
        return newest is { ToVersion: null } && newest.FromVersion == known.NewestFrom
            ? (known, newest)
            : throw StoreErrors.Damaged(database.File, RevisionRow.Table, name, "its newest revision is missing");
    }

    /// <summary>All revisions, newest first.</summary>
    /// <param name="database">Records.</param>
    /// <param name="kind">Kind of resource.</param>
    /// <param name="name">Resource name.</param>
    public static IReadOnlyList<RevisionHead> History(Database database, ResourceKind kind, string name)
    {
        var found = RevisionRow.OfResource(database, kind, name);
        var known = ResourceRow.Find(database, kind, name);
        return Problem(found, known) is { } problem ? throw StoreErrors.Damaged(database.File, RevisionRow.Table, name, problem) : found;
    }

    /// <summary>What contradicts itself in the revisions of a resource; null where nothing does.</summary>
    /// <param name="found">Revisions, newest first.</param>
    /// <param name="known">What is known of the resource.</param>
    public static string? Problem(IReadOnlyList<RevisionHead> found, ResourceRow? known)
    {
        if (found.Count != (known?.Revisions ?? 0))
        {
            return FormattableString.Invariant($"{found.Count} revisions were found, and there must be {known?.Revisions ?? 0}");
        }

        if (known is not null && (found.Count == 0 || found[0].FromVersion != known.NewestFrom || found[0].ToVersion != known.NewestTo))
        {
            return "its newest revision is not the one that it must have";
        }

        for (var i = 1; i < found.Count; i++)
        {
            if (!(found[i].ToVersion <= found[i - 1].FromVersion))
            {
                return FormattableString.Invariant($"the revisions from versions {found[i].FromVersion} and {found[i - 1].FromVersion} overlap");
            }
        }

        return null;
    }
}
