using System.Collections.Immutable;

namespace PermitScreen.Rating.Checks;

/// <summary>The ladder climbed: every rung, and the one that counts.</summary>
/// <param name="Verdict">Verdict of the member check alone; standing and fit are judged beside it.</param>
/// <param name="Rungs">Every rung in the policy's order.</param>
/// <param name="Reported">The first rung that passes; else the last one that is available; null where there is none.</param>
public sealed record LadderResult(Verdict Verdict, ImmutableArray<RungResult> Rungs, RungResult? Reported);
