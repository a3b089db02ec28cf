using PermitScreen.Catalogue.Lines;

namespace PermitScreen.Service;

/// <summary>Versions of the engine, bumped only when a result can change.</summary>
public static class EngineVersions
{
    /// <summary>Version of the mechanics: lines and extremes.</summary>
    public const string Mechanics = TrussKey.MechanicsVersion;

    /// <summary>Version of the rating rules.</summary>
    public const string Rating = "1";
}
