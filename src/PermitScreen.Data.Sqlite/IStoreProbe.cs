namespace PermitScreen.Data.Sqlite;

/// <summary>Told of each moment at which a process may end, so that tests can end it there.</summary>
public interface IStoreProbe
{
    /// <summary>Called on the thread that does the work. What it throws ends the work as any error would.</summary>
    /// <param name="moment">Moment.</param>
    /// <param name="what">What is being done.</param>
    void Reached(StoreMoment moment, string what);
}
