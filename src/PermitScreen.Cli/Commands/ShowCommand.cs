using System.CommandLine;
using System.Globalization;
using Google.Protobuf;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using Spectre.Console;

namespace PermitScreen.Cli.Commands;

/// <summary>Shows a structure and its influence lines.</summary>
internal static class ShowCommand
{
    private const int LineCharacters = 48;
    private const string Bars = " ▁▂▃▄▅▆▇█";

    public static Command Create()
    {
        var name = new Argument<string>("structure") { Description = "Resource name or agency number, for instance structures/P14-0032 or P14-0032." };
        var effect = new Option<string>("--effect") { Description = "Only the line of this effect, with its ordinates.", DefaultValueFactory = _ => "" };
        var asOfVersion = VersionOptions.AsOf();
        var json = new Option<bool>("--json") { Description = "Print structure and lines as JSON, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("show", "Show a structure and its influence lines.") { name, effect, asOfVersion, json };
        service.AddTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var resource = ResourceNames.Structure(parsed.GetValue(name)!);
            var version = VersionOptions.Checked(asOfVersion, parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var request = new GetStructureRequest { Name = resource };
            if (version is { } asOf)
            {
                request.AsOfVersion = asOf;
            }

            var structure = (await connection.Catalogue.GetStructureAsync(request, connection.Call(cancellation))).Structure;
            var lines = await LinesAsync(connection, resource, parsed.GetValue(effect)!, version, cancellation);
            if (parsed.GetValue(json))
            {
                Console.Out.WriteLine($"{{ \"structure\": {JsonFormatter.Default.Format(structure)}, \"lines\": [{string.Join(",\n", lines.Select(l => JsonFormatter.Default.Format(l)))}] }}");
                return ExitCodes.Passed;
            }

            Print(structure, lines, parsed.GetValue(effect)!.Length > 0);
            return ExitCodes.Passed;
        });
        return command;
    }

    private static async Task<IReadOnlyList<InfluenceLine>> LinesAsync(ServiceConnection connection, string resource, string effect, long? asOfVersion, CancellationToken cancellation)
    {
        var all = new List<InfluenceLine>();
        var request = new ListInfluenceLinesRequest { Parent = resource, EffectId = effect, PageSize = Listings.LargestPage };
        if (asOfVersion is { } version)
        {
            request.AsOfVersion = version;
        }

        do
        {
            var page = await connection.Catalogue.ListInfluenceLinesAsync(request, connection.Call(cancellation));
            all.AddRange(page.InfluenceLines);
            request.PageToken = page.NextPageToken;
        }
        while (request.PageToken.Length > 0);
        return all;
    }

    private static void Print(Structure structure, IReadOnlyList<InfluenceLine> lines, bool ordinates)
    {
        var console = Consoles.Create();
        console.WriteLine(FormattableString.Invariant($"{structure.Name} {structure.Title}, owner {structure.Owner}, state {Numbers.Words(structure.State)}, from catalogue version {structure.CatalogueVersion}, etag {structure.Etag}"));
        if (structure.Roadway is { } roadway)
        {
            console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"Roadway {roadway.LeftKerbM:0.###} to {roadway.RightKerbM:0.###} m, {roadway.LaneCount} lanes"));
        }

        foreach (var unit in structure.Units)
        {
            var planes = unit.Truss is null ? "" : ", planes " + string.Join(", ", unit.Truss.Planes.Select(p => string.Create(CultureInfo.InvariantCulture, $"{p.PlaneId} at {p.LateralM:0.###} m")));
            console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"Unit {unit.UnitId} from chainage {unit.StartChainageM:0.###} m{planes}, {unit.Effects.Count} effects"));
        }

        console.WriteLine("Influence lines: effect per kN of load on the whole plane; tension, upward reaction positive. Drawn: positive part above, negative part below.");
        var table = new Table().Border(TableBorder.Simple);
        table.AddColumns("Unit", "Effect", "What", "Largest", "at m", "Smallest", "at m", "Line");
        foreach (var line in lines)
        {
            var highest = Extreme(line, +1);
            var lowest = Extreme(line, -1);
            table.AddRow(
                new Text(line.UnitId),
                new Text(line.EffectId),
                new Text(line.Description),
                new Text(Ordinate(highest.Ordinate)),
                new Text(Numbers.Plain(highest.AtM)),
                new Text(Ordinate(lowest.Ordinate)),
                new Text(Numbers.Plain(lowest.AtM)),
                new Text($"{Drawn(line, +1)}\n{Drawn(line, -1)}"));
        }

        console.Write(table);
        if (ordinates)
        {
            foreach (var point in lines.SelectMany(l => l.Points))
            {
                console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"  {point.ChainageM,10:0.000} m  before {point.BeforePerKn,10:0.000000}  after {point.AfterPerKn,10:0.000000}"));
            }
        }
    }

    private static (double Ordinate, double AtM) Extreme(InfluenceLine line, int sign)
    {
        (double Ordinate, double AtM) best = (0, line.Points.Count > 0 ? line.Points[0].ChainageM : 0);
        foreach (var point in line.Points)
        {
            var ordinate = sign * Math.Max(sign * point.BeforePerKn, sign * point.AfterPerKn);
            if (sign * ordinate > sign * best.Ordinate)
            {
                best = (ordinate, point.ChainageM);
            }
        }

        return best;
    }

    /// <summary>One part of the line as a row of bars; bars of the negative part grow with its size too.</summary>
    private static string Drawn(InfluenceLine line, int sign)
    {
        var largest = Math.Max(Math.Abs(Extreme(line, +1).Ordinate), Math.Abs(Extreme(line, -1).Ordinate));
        if (line.Points.Count < 2 || largest == 0)
        {
            return "";
        }

        var start = line.Points[0].ChainageM;
        var length = line.Points[^1].ChainageM - start;
        var bars = Enumerable.Range(0, LineCharacters).Select(i =>
        {
            var part = Math.Max(0, sign * At(line, start + length * (i + 0.5) / LineCharacters)) / largest;
            return part <= 0 ? Bars[0] : Bars[Math.Clamp((int)Math.Ceiling(part * (Bars.Length - 1)), 1, Bars.Length - 1)];
        });
        return (sign > 0 ? "+ " : "- ") + string.Concat(bars).TrimEnd();
    }

    private static double At(InfluenceLine line, double x)
    {
        for (var i = 1; i < line.Points.Count; i++)
        {
            var (a, b) = (line.Points[i - 1], line.Points[i]);
            if (x <= b.ChainageM)
            {
                return a.AfterPerKn + (b.BeforePerKn - a.AfterPerKn) * (x - a.ChainageM) / (b.ChainageM - a.ChainageM);
            }
        }

        return 0;
    }

    private static string Ordinate(double value) => value.ToString("0.0000", CultureInfo.InvariantCulture);
}
