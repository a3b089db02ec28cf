using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Rating.Lateral;
using PermitScreen.Rating.Policies;
using PermitScreen.Rating.Structures;
using PermitScreen.Rating.Vehicles;

namespace PermitScreen.Rating.Ladder;

/// <summary>What loads the effects of one unit on one rung: the permit in one configuration, and who else is there.</summary>
/// <param name="Policy">Policy.</param>
/// <param name="Rung">Rung.</param>
/// <param name="Unit">Unit.</param>
/// <param name="ConfigurationId">Configuration.</param>
/// <param name="Permit">Permit vehicle.</param>
/// <param name="Directions">Directions in which the permit may travel over the structure.</param>
/// <param name="Arrangements">Arrangements across the roadway; at least one.</param>
/// <param name="Factors">Live-load factors of the permit.</param>
public sealed record RungLoad(
    Policy Policy,
    Rung Rung,
    RatedUnit Unit,
    string ConfigurationId,
    PermitVehicle Permit,
    TravelDirections Directions,
    ImmutableArray<Arrangement> Arrangements,
    LiveLoadFactors Factors)
{
    /// <summary>Intensity of the uniform load in the permit's lane for an effect, kN/m; 0 where none applies (rule A5).</summary>
    /// <param name="effect">Effect.</param>
    /// <param name="sense">Which sign of its line is loaded.</param>
    public double SameLaneKnPerM(RatedEffect effect, Sense sense)
    {
        if (!Rung.SameLaneLoaded || Policy.SameLane is not { } load)
        {
            return 0;
        }

        // A truss has no hogging moment as such: it is what loads a chord or web member over a pier from the spans on both sides.
        var hogging = load.ForHoggingAndInteriorReactions && AdverseParts.InAdjacentSpans(effect.Line, sense, Unit.BearingsM);
        var interior = load.ForHoggingAndInteriorReactions && effect.InteriorReaction;
        return Unit.LongestSpanM > load.ForSpansOverM || hogging || interior ? load.LoadKnPerM : 0;
    }
}
