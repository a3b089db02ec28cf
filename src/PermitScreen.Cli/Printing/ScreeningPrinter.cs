using System.Globalization;
using PermitScreen.Contracts.V1;
using Spectre.Console;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints a screening: the caution first, the route at a glance, then crossing by crossing.</summary>
/// <param name="console">Where to.</param>
/// <param name="screening">Screening.</param>
/// <param name="title">Title of the application.</param>
/// <param name="arithmetic">Whether the arithmetic of every crossing is printed.</param>
internal sealed class ScreeningPrinter(IAnsiConsole console, Contracts.V1.Screening screening, string title, bool arithmetic)
{
    public void Print()
    {
        Line($"Application {screening.ApplicationReference}: {title}");
        Line(string.Create(CultureInfo.InvariantCulture, $"Policy {screening.Policy}, as of {Numbers.Date(screening.AsOfDate)}, catalogue version {screening.CatalogueVersion}, mechanics {screening.MechanicsVersion}, rating {screening.RatingVersion}"));
        Line("");
        Line($"CAUTION  {screening.Caution}");
        foreach (var notice in screening.Notices)
        {
            Line($"Note     {notice}");
        }

        Line("");
        Line($"Route: {Numbers.Words(screening.Verdict)}");
        var counts = screening.Counts;
        Line(string.Create(CultureInfo.InvariantCulture, $"{counts.Pass} pass, {counts.PassWithConditions} pass with conditions, {counts.NotAssessed} not assessed, {counts.Fail} fail"));
        Table();
        for (var i = 0; i < screening.Crossings.Count; i++)
        {
            new CrossingPrinter(Line, i + 1, screening.Crossings[i], arithmetic).Print();
        }
    }

    private void Table()
    {
        var table = new Table().Border(TableBorder.Simple).Expand();
        table.AddColumn(new TableColumn("#").RightAligned().NoWrap());
        table.AddColumn(new TableColumn("Structure"));
        table.AddColumn(new TableColumn("Verdict").NoWrap());
        table.AddColumn(new TableColumn("RF").RightAligned().NoWrap());
        table.AddColumn(new TableColumn("k").RightAligned().NoWrap());
        table.AddColumn(new TableColumn("Rung, or reason"));
        table.AddColumn(new TableColumn("Governs"));
        for (var i = 0; i < screening.Crossings.Count; i++)
        {
            var crossing = screening.Crossings[i];
            table.AddRow(
                new Text((i + 1).ToString(CultureInfo.InvariantCulture)),
                new Text($"{crossing.Structure["structures/".Length..]} {crossing.Title}{(crossing.Relation == CrossingRelation.Under ? " (beneath)" : "")}"),
                new Text(Numbers.Words(crossing.Verdict)),
                new Text(Numbers.Factor(crossing.HasRatingFactor, crossing.RatingFactor)),
                new Text(Numbers.Factor(crossing.HasLargestAxleFactor, crossing.LargestAxleFactor)),
                new Text(crossing.RungId.Length > 0 ? crossing.RungId : Reasons(crossing)),
                new Text(crossing is { Governing: { } governing, HasRatingFactor: true } ? $"{governing.Effect.EffectId} {Numbers.Words(governing.Effect.Sense)}, {governing.Effect.PlaneId}" : "-"));
        }

        console.Write(table);
        Line("RF scales all live load, k the permit's axle loads alone; both are shown truncated, never rounded up. They are those of the members on the first rung that passes, or else on the last one available, whatever standing and fit say.");
    }

    private static string Reasons(CrossingResult crossing) =>
        string.Join(", ", crossing.Reasons.Select(r => r.Code).Distinct().Select(c => Words(c)));

    private static string Words(ReasonCode code) => code switch
    {
        ReasonCode.Overloaded => "overloaded",
        ReasonCode.DeadLoadExceedsCapacity => "dead load exceeds capacity",
        ReasonCode.Closed => "closed",
        ReasonCode.Posted => "posted",
        ReasonCode.Height => "too high",
        ReasonCode.Width => "too wide",
        ReasonCode.NoRoomOnRoadway => "no room on the roadway",
        ReasonCode.DataMissing => "data missing",
        ReasonCode.NotModelled => "not modelled yet",
        ReasonCode.NotInCatalogue => "not in the catalogue",
        ReasonCode.Standing => "shored or temporary",
        ReasonCode.PoorCondition => "poor condition",
        ReasonCode.InspectionOverdue => "inspection overdue",
        ReasonCode.NoRungAvailable => "no rung available",
        ReasonCode.NoLaneBeside => "no lane beside",
        ReasonCode.MethodMismatch => "no resistance of the policy's method",
        ReasonCode.LinesPending => "lines pending",
        ReasonCode.NoFactorForPermitKind => "no factor for this kind of permit",
        _ => "reason not known",
    };

    /// <summary>Writes a line, broken at spaces where it is too long, with what follows set in.</summary>
    private void Line(string text)
    {
        var setIn = text.StartsWith("   ", StringComparison.Ordinal) ? 22 : 9;
        var width = Math.Max(console.Profile.Width, 4 * setIn) - 1;
        var indent = "";
        while (indent.Length + text.Length > width)
        {
            var at = text.LastIndexOf(' ', width - indent.Length);
            if (at <= 0 || text[..at].Trim().Length == 0)
            {
                break;
            }

            console.WriteLine(indent + text[..at]);
            text = text[(at + 1)..];
            indent = new string(' ', setIn);
        }

        console.WriteLine(indent + text);
    }
}
