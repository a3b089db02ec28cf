using System.Collections.Immutable;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Catalogue.Storage;

/// <summary>An item that was refused.</summary>
/// <param name="Piece">Index of its piece.</param>
/// <param name="Resource">Resource name, as far as it could be read.</param>
/// <param name="Origin">Where it came from; empty where not said.</param>
/// <param name="Faults">Every fault.</param>
public sealed record ImportRefusal(int Piece, string Resource, string Origin, ImmutableArray<Fault> Faults);
