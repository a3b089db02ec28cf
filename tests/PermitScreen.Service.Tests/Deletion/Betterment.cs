using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Structures;
using PermitScreen.Screening.Crossings;

namespace PermitScreen.Service.Tests.Deletion;

/// <summary>In what a screening is better than another one. Nothing may be found where a field was only taken away.</summary>
internal static class Betterment
{
    private const double Tolerance = 1e-12;

    /// <summary>The first thing that is better, or null.</summary>
    public static string? Of(RouteResult before, RouteResult after)
    {
        if (after.Crossings.Length != before.Crossings.Length)
        {
            return "another number of crossings";
        }

        return before.Crossings.Zip(after.Crossings, OfCrossing).FirstOrDefault(b => b is not null);
    }

    private static string? OfCrossing(CrossingResult before, CrossingResult after)
    {
        // A crossing that does not pass may come to be not assessed for another reason; what counts is that it is still not passed.
        if (before.Verdict.IsPass() ? after.Verdict < before.Verdict : after.Verdict.IsPass())
        {
            return $"{before.Crossing.Structure}: verdict {before.Verdict} became {after.Verdict}";
        }

        if (before.Ladder is not { } climbed || after.Ladder is not { } climbedAgain)
        {
            return null;
        }

        foreach (var rung in climbedAgain.Rungs.Where(IsComplete))
        {
            var was = climbed.Rungs.SingleOrDefault(r => r.Rung.RungId == rung.Rung.RungId);
            if (was is null)
            {
                return $"{before.Crossing.Structure}: rung {rung.Rung.RungId} is new";
            }

            if (rung.Outcome == RungOutcome.Passes && was.Outcome != RungOutcome.Passes)
            {
                return $"{before.Crossing.Structure}: rung {rung.Rung.RungId} {was.Outcome} became {rung.Outcome}";
            }

            if (IsComplete(was) && OfRung(was, rung) is { } better)
            {
                return $"{before.Crossing.Structure}, {rung.Rung.RungId}: {better}";
            }
        }

        return null;
    }

    private static string? OfRung(RungResult before, RungResult after)
    {
        var found = after.Effects.ToDictionary(Key);
        foreach (var was in before.Effects)
        {
            if (!found.TryGetValue(Key(was), out var now))
            {
                return $"{Key(was)} is no longer rated";
            }

            if (Rank(now) > Rank(was) || (now.RatingFactor > was.RatingFactor && now.RatingFactor - was.RatingFactor > Tolerance * Math.Abs(was.RatingFactor.Value)))
            {
                return FormattableString.Invariant($"RF of {Key(was)} from {was.RatingFactor} to {now.RatingFactor}");
            }
        }

        return null;
    }

    /// <summary>Every rated effect was rated: no reason but overload.</summary>
    private static bool IsComplete(RungResult rung) =>
        rung.Outcome is RungOutcome.Passes or RungOutcome.Fails
        && rung.Reasons.All(r => r.Code is ReasonCode.Overloaded or ReasonCode.DeadLoadExceedsCapacity or ReasonCode.NoRoomOnRoadway);

    private static (string Unit, string Effect, string Plane, EffectSense Sense) Key(EffectResult e) =>
        (e.Effect.UnitId, e.Effect.EffectId, e.Effect.PlaneId, e.Sense);

    private static int Rank(EffectResult e) => e.State switch
    {
        RatingFactorState.DeadLoadExceeds => 0,
        RatingFactorState.Number => 1,
        _ => 2,
    };
}
