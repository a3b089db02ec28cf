using System.Globalization;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints one crossing: verdict, conditions, what governs, where the vehicle stands, and the arithmetic.</summary>
/// <param name="line">Writes a line.</param>
/// <param name="number">Number on the route.</param>
/// <param name="crossing">Crossing.</param>
/// <param name="arithmetic">Whether the arithmetic is printed.</param>
internal sealed class CrossingPrinter(Action<string> line, int number, CrossingResult crossing, bool arithmetic)
{
    private const int MostReasons = 6;
    private const int MostNotRated = 3;

    public void Print()
    {
        line("");
        line(string.Create(CultureInfo.InvariantCulture, $"{number}. {crossing.Structure} {crossing.Title}: {Numbers.Words(crossing.Verdict)}"));
        if (crossing.Conditions.Length > 0)
        {
            line($"   Travel conditions  {crossing.Conditions}");
        }

        Reasons("   Reason             ", crossing.Reasons);
        Reasons("   Flag               ", crossing.Flags);
        if (crossing.Relation == CrossingRelation.Under)
        {
            line("   Basis              height and width only");
        }

        if (arithmetic)
        {
            foreach (var rung in crossing.Rungs)
            {
                Rung(rung);
            }
        }

        if (crossing.Governing is { } governing)
        {
            line($"   {(crossing.HasRatingFactor || governing.RatingFactorState != RatingFactorState.Number ? "Governs           " : "Least assessed    ")} {Numbers.Words(governing.Effect)}{(governing.Effect.Element.Length > 0 ? $" ({governing.Effect.Element})" : "")}, configuration {governing.ConfigurationId}");
            if (governing.LiveLoads.Count > 0 && governing.LiveLoads[0].Position is not null)
            {
                line($"   Vehicle            {Place(governing.LiveLoads[0])}");
            }

            if (arithmetic)
            {
                Arithmetic(governing);
                Next();
            }
        }

        NotRated();
    }

    private void Rung(RungResult rung)
    {
        var rf = rung.HasRatingFactor ? $", RF {Numbers.Factor(true, rung.RatingFactor)}" : "";
        var governs = rung.Governing is { } g ? $" by {g.Effect.EffectId} {Numbers.Words(g.Effect.Sense)}, {g.Effect.PlaneId}" : "";
        var why = rung.Outcome is RungOutcome.Unavailable && rung.Reasons.Count > 0 ? $": {rung.Reasons[0].Message}" : "";
        line($"   Rung               {rung.RungId}: {Numbers.Words(rung.Outcome)}{rf}{(rf.Length > 0 ? governs : "")}{why}");
    }

    private void Arithmetic(EffectResult result)
    {
        var c = result.Capacity;
        line($"   Capacity           C = {Numbers.Kn(c.GivenResistance)} × φ {Numbers.Fixed(c.ResistanceFactor)} × φcφs {Numbers.Fixed(c.ConditionTimesSystem)} = {Numbers.Kn(c.Capacity)} kN{(c.Note.Length > 0 ? $" ({c.Note})" : "")}");
        var terms = result.DeadLoads.Select(d => $"{Component(d.Component)} {Numbers.Fixed(d.LoadFactor)} × {Numbers.Kn(d.Load)}");
        line($"   Dead load          ΣγD = {string.Join(" + ", terms)} = {Numbers.Kn(result.DeadLoads.Sum(d => d.Factored))} kN (negative relieves)");
        line($"   Numerator          N = C − ΣγD = {Numbers.Kn(result.Numerator)} kN");
        foreach (var load in result.LiveLoads)
        {
            line($"   Live load          {load.Description}: {Numbers.Kn(load.StaticEffect)} × share {Numbers.Fixed(load.LateralShare)} × m {Numbers.Fixed(load.MultiplePresence)} × (1 + {Numbers.Fixed(load.Allowance)}) × γ {Numbers.Fixed(load.LiveLoadFactor)} = {Numbers.Kn(load.Factored)} kN");
            line($"                        {(load.Position is null ? "on the adverse areas" : Place(load))}; γ: {load.FactorNote}");
        }

        line(result.RatingFactorState switch
        {
            RatingFactorState.Number => $"   Rating factor      RF = {Numbers.Kn(result.Numerator)} / {Numbers.Kn(result.Denominator)} = {Numbers.FourDecimals(result.RatingFactor)}, shown as {Numbers.Factor(true, result.RatingFactor)}; k = {Numbers.Factor(result.HasLargestAxleFactor, result.LargestAxleFactor)}",
            RatingFactorState.NoLiveLoad => "   Rating factor      not applicable: no live load in this sense",
            _ => "   Rating factor      none: dead load alone exceeds the capacity; k = 0",
        });
    }

    /// <summary>The effects that come next on the rung whose governing effect is shown.</summary>
    private void Next()
    {
        var rung = crossing.Rungs.LastOrDefault(r => r.Governing is { } g && g.Equals(crossing.Governing));
        foreach (var effect in rung?.Next ?? [])
        {
            line($"   Next               RF {Numbers.Factor(effect.HasRatingFactor, effect.RatingFactor)}, k {Numbers.Factor(effect.HasLargestAxleFactor, effect.LargestAxleFactor)}: {effect.Effect.EffectId} {Numbers.Words(effect.Effect.Sense)}, {effect.Effect.PlaneId}");
        }
    }

    private static string Place(LiveLoadArithmetic load)
    {
        var p = load.Position;
        return string.Create(CultureInfo.InvariantCulture, $"lead axle at {p.LeadChainageM:0.000} m{(p.Side == Side.Before ? " (just before)" : p.Side == Side.After ? " (just after)" : "")}, {Numbers.Words(p.Direction)}, axles {Numbers.Axles(p.AxlesOnStructure)} on the deck, centre at {p.CentreLateralM:+0.00;-0.00;0.00} m");
    }

    private void Reasons(string head, Google.Protobuf.Collections.RepeatedField<Reason> reasons)
    {
        foreach (var reason in reasons.Take(MostReasons))
        {
            line($"{head}{reason.Message}{(reason.Field.Length > 0 ? $" [{reason.Field}]" : "")}");
        }

        if (reasons.Count > MostReasons)
        {
            line(string.Create(CultureInfo.InvariantCulture, $"{head}and {reasons.Count - MostReasons} more; --json has all of them"));
        }
    }

    private void NotRated()
    {
        if (crossing.NotRated.Count == 0)
        {
            return;
        }

        var groups = crossing.NotRated.GroupBy(n => n.Reason).ToList();
        foreach (var group in groups.Take(MostNotRated))
        {
            var names = string.Join(", ", group.Select(n => $"{n.Effect.EffectId} {n.Effect.PlaneId}").Distinct());
            line($"   Not rated          {names}: {group.Key}");
        }

        var left = groups.Skip(MostNotRated).SelectMany(g => g).Select(n => $"{n.Effect.EffectId} {n.Effect.PlaneId}").Distinct().ToList();
        if (left.Count > 0)
        {
            line(string.Create(CultureInfo.InvariantCulture, $"   Not rated          and {left.Count} more for other reasons: {string.Join(", ", left)}; --json has the reasons"));
        }
    }

    private static string Component(DeadLoadComponent component) => component switch
    {
        DeadLoadComponent.Dc => "DC",
        DeadLoadComponent.Dc1 => "DC1",
        DeadLoadComponent.Dc2 => "DC2",
        DeadLoadComponent.Dw => "DW",
        _ => "P",
    };
}
