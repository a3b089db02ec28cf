using PermitScreen.Rating.Structures;

namespace PermitScreen.Rating.Checks;

/// <summary>One dead-load term.</summary>
/// <param name="Component">Component.</param>
/// <param name="LoadKn">Load in the sense rated, kN; negative where it relieves.</param>
/// <param name="LoadFactor">Load factor.</param>
public readonly record struct DeadLoadArithmetic(DeadLoadComponent Component, double LoadKn, double LoadFactor)
{
    /// <summary>Product, kN.</summary>
    public double FactoredKn => LoadFactor * LoadKn;
}
