using PermitScreen.Catalogue.Storage;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>Content address of a truss's lines: SHA-256 over geometry, connectivity, stiffness, supports and deck. Names and order are not part of it.</summary>
public static class TrussKey
{
    /// <summary>Bumped whenever the same truss can give other lines, in their last bit too.</summary>
    public const string MechanicsVersion = "2";

    /// <summary>The address.</summary>
    /// <param name="model">Truss.</param>
    public static Digest Of(TrussModel model) => CanonicalTruss.Of(model).Key;
}
