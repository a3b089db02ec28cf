using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Schema;

/// <summary>Brings a file to the newest schema, one transaction a step, and refuses what it does not know.</summary>
/// <param name="scripts">Migrations.</param>
/// <param name="probe">Told after each statement.</param>
internal sealed class Migrator(SchemaScripts scripts, IStoreProbe? probe)
{
    /// <summary>Page size of every file, so that one can be copied into another page by page.</summary>
    public const int PageSizeBytes = 4096;

    /// <summary>The schema version of a file; 0 where it is empty. Writes nothing.</summary>
    /// <param name="database">File.</param>
    /// <exception cref="StoreException">It is of another program, damaged, or of a newer version of this one.</exception>
    public int Recognise(Database database)
    {
        var schema = database.Whole("PRAGMA user_version");
        var application = database.Whole("PRAGMA application_id");
        var objects = database.Whole("SELECT count(*) FROM sqlite_schema");
        if (schema == 0 && application == 0 && objects == 0)
        {
            return 0;
        }

        if (application != scripts.ApplicationId)
        {
            throw Refuse(StoreTrouble.Other, database, "it is a database of another program, or the mark in its header is damaged");
        }

        if (schema > scripts.Newest)
        {
            throw Refuse(StoreTrouble.NewerSchema, database, FormattableString.Invariant($"its schema version is {schema}, and this program knows {scripts.Newest}"));
        }

        return schema > 0 && objects > 0 ? (int)schema : throw Refuse(StoreTrouble.Damaged, database, "its header contradicts its content");
    }

    /// <summary>Brings a file to the newest schema.</summary>
    /// <param name="database">File.</param>
    /// <param name="from">Its schema version.</param>
    /// <param name="begin">Writes the first rows of an empty file, in the transaction of the first migration.</param>
    /// <exception cref="StoreException">It is not what the schema says afterwards.</exception>
    public void Migrate(Database database, int from, Action<Database> begin)
    {
        for (var step = from; step < scripts.Newest; step++)
        {
            Take(database, step, begin);
        }

        if (!SchemaText.Of(database).SequenceEqual(SchemaText.Expected(scripts)))
        {
            throw Refuse(StoreTrouble.Damaged, database, "its tables are not those of its schema version");
        }
    }

    private void Take(Database database, int step, Action<Database> begin)
    {
        database.RunOnce("BEGIN IMMEDIATE");
        try
        {
            foreach (var statement in scripts.Scripts[step])
            {
                database.RunOnce(statement);
                probe?.Reached(StoreMoment.InMigration, $"{scripts.Name} {step + 1}");
            }

            if (step == 0)
            {
                begin(database);
            }

            database.Pragma(FormattableString.Invariant($"user_version = {step + 1}"));
            probe?.Reached(StoreMoment.InMigration, $"{scripts.Name} {step + 1}");
            database.RunOnce("COMMIT");
        }
        catch
        {
            if (database.InTransaction)
            {
                database.RunOnce("ROLLBACK");
            }

            throw;
        }
    }

    private static StoreException Refuse(StoreTrouble trouble, Database database, string detail) =>
        new(trouble, StoreErrors.Message(trouble, database.File, detail));
}
