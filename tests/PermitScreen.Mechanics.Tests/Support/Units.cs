namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>US customary units, by definition: the international foot, the pound and standard gravity.</summary>
internal static class Units
{
    internal const double FtM = 0.3048;

    internal const double KipKn = 4.4482216152605;

    internal const double KipFtKnm = KipKn * FtM;
}
