using System.Globalization;

namespace PermitScreen.Service.Tests.Deletion;

/// <summary>How all deletions of a run came out.</summary>
public sealed class DeletionCounts : IDisposable
{
    public int Deletions { get; set; }

    public int Refused { get; set; }

    public int NotAssessed { get; set; }

    public int Better { get; set; }

    public void Dispose() => Figures.Note("deletion", string.Create(
        CultureInfo.InvariantCulture,
        $"{Deletions} deletions, {Refused} refused, {NotAssessed} not assessed, {Better} better"));
}
