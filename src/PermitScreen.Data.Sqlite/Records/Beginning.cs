using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;
using PermitScreen.Data.Sqlite.Rows;

namespace PermitScreen.Data.Sqlite.Records;

/// <summary>The first rows of new records.</summary>
internal static class Beginning
{
    private const string Actor = "permitscreen";
    private const string Action = "create records";
    private const string Reason = "There were none in this folder.";

    /// <summary>Writes them.</summary>
    /// <param name="database">Empty records, in a transaction.</param>
    /// <param name="now">When.</param>
    public static void Write(Database database, DateTimeOffset now)
    {
        var empty = new VersionRow(Guid.NewGuid(), 0, default, 0, AuditRow.OfNothing);
        empty.Insert(database);
        ChangeSetWriter.Log(database, empty, Action, "version 0", new Provenance(Actor, Reason, Instants.Kept(now)), version: null, AuditRow.OfNothing);
    }
}
