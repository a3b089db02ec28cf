using PermitScreen.Catalogue.Storage;
using PermitScreen.Data.Sqlite.Engine;

namespace PermitScreen.Data.Sqlite.Keeping;

/// <summary>Goes through stages of a verification, tells of progress and of every problem, and never stops at the first.</summary>
/// <param name="database">Records, in a transaction.</param>
/// <param name="tell">Takes what is told.</param>
/// <param name="cancellation">Ends it.</param>
internal sealed class VerificationLog(Database database, Action<VerificationStep> tell, CancellationToken cancellation)
{
    private const int RowsBetweenSteps = 1000;

    private string _stage = "";
    private long _done;
    private long? _total;

    /// <summary>Records.</summary>
    public Database Database => database;

    /// <summary>Goes through a stage; what keeps it from being finished is a problem too.</summary>
    /// <param name="name">Name.</param>
    /// <param name="table">Table whose rows are counted; null where there is none.</param>
    /// <param name="work">Work.</param>
    public void Stage(string name, string? table, Action work)
    {
        (_stage, _done, _total) = (name, 0, null);
        Tolerate(() => _total = table is null ? null : database.Whole($"SELECT count(*) FROM {table}"));
        tell(new VerificationStep(_stage, 0, _total, Problem: null));
        Tolerate(work);
        tell(new VerificationStep(_stage, _done, _total, Problem: null));
    }

    /// <summary>Reads every row of a query; one that is damaged is told and passed over.</summary>
    /// <param name="table">Table, for messages.</param>
    /// <param name="sql">Query.</param>
    /// <param name="read">Reads a row.</param>
    /// <param name="check">Checks what was read.</param>
    public void Each<T>(string table, string sql, Func<RowCursor, T> read, Action<T> check)
    {
        using var rows = database.Query(table, sql);
        while (rows.Next())
        {
            Tolerate(() => check(read(rows)));
            if (++_done % RowsBetweenSteps == 0)
            {
                tell(new VerificationStep(_stage, _done, _total, Problem: null));
            }
        }
    }

    /// <summary>Tells of a problem.</summary>
    /// <param name="what">What is wrong.</param>
    public void Problem(string what) => tell(new VerificationStep(_stage, _done, _total, what));

    /// <summary>Tells of a problem unless something holds.</summary>
    /// <param name="holds">Whether it holds.</param>
    /// <param name="what">What is wrong.</param>
    public void Demand(bool holds, FormattableString what)
    {
        if (!holds)
        {
            Problem(FormattableString.Invariant(what));
        }
    }

    private void Tolerate(Action work)
    {
        cancellation.ThrowIfCancellationRequested();
        try
        {
            database.Guarded(_ =>
            {
                work();
                return true;
            });
        }
        catch (StoreException error) when (error.Trouble is StoreTrouble.Damaged or StoreTrouble.Other)
        {
            Problem(error.Message);
        }
    }
}
