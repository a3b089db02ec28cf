using System.Runtime.InteropServices;

namespace PermitScreen.Mechanics.Trusses;

/// <summary>How well the stiffness equations of a truss were solved, worst over all unit loads.</summary>
/// <param name="LargestResidual">Largest residual of K·u = f over ‖K‖·‖u‖ + ‖f‖ (largest-entry norms); dimensionless.</param>
/// <param name="LargestEquilibriumError">Largest unbalanced force on a joint, from the member forces and reactions handed out, as a share of the unit load.</param>
/// <param name="LargestCorrection">Largest change of a member force in the last refinement, as a share of the larger of the unit load and the largest force.</param>
[StructLayout(LayoutKind.Auto)]
public readonly record struct SolveQuality(double LargestResidual, double LargestEquilibriumError, double LargestCorrection);
