using PermitScreen.Data.Sqlite;

namespace PermitScreen.Data.Tests.Support;

/// <summary>Ends the work at a moment.</summary>
internal sealed class ThrowingProbe(StoreMoment? at) : IStoreProbe
{
    public StoreMoment? At { get; set; } = at;

    public void Reached(StoreMoment moment, string what)
    {
        if (moment == At)
        {
            throw new InvalidOperationException($"ended at {moment}, {what}");
        }
    }
}
