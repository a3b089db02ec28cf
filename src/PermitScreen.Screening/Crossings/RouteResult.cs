using System.Collections.Immutable;
using PermitScreen.Rating.Checks;

namespace PermitScreen.Screening.Crossings;

/// <summary>A whole answer.</summary>
/// <param name="Verdict">Worst verdict of all crossings.</param>
/// <param name="Crossings">Crossings in travel order.</param>
/// <param name="CatalogueVersion">Catalogue version screened against.</param>
public sealed record RouteResult(Verdict Verdict, ImmutableArray<CrossingResult> Crossings, long CatalogueVersion)
{
    /// <summary>How many crossings have a verdict (rule F1: all counts are shown).</summary>
    /// <param name="verdict">Verdict.</param>
    public int Count(Verdict verdict) => Crossings.Count(c => c.Verdict == verdict);
}
