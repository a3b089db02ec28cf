using PermitScreen.Mechanics.Faults;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Lines;

/// <summary>Gives the lines of a truss, kept or computed. Thread-safe.</summary>
public interface ILineSource
{
    /// <summary>The lines of a truss; null with faults where it is a mechanism or cannot be solved accurately.</summary>
    /// <param name="model">Truss.</param>
    /// <param name="faults">Takes what is wrong, in the truss's own names.</param>
    TrussLines? GetOrSolve(TrussModel model, FaultList faults);
}
