using System.Globalization;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Numbers and words as people read them.</summary>
internal static class Numbers
{
    private const int FactorDecimals = 2;

    /// <summary>A factor, truncated and never rounded up: 0.996 shows as 0.99 (rule B7).</summary>
    public static string Factor(bool has, double value)
    {
        if (!has)
        {
            return "-";
        }

        var scale = Math.Pow(10, FactorDecimals);
        return (Math.Truncate(value * scale) / scale).ToString("0.00", CultureInfo.InvariantCulture);
    }

    public static string Kn(double value) => value.ToString("0.00", CultureInfo.InvariantCulture);

    /// <summary>A factor with four decimals, truncated.</summary>
    public static string FourDecimals(double value) => (Math.Truncate(value * 10000) / 10000).ToString("0.0000", CultureInfo.InvariantCulture);

    public static string Plain(double value) => value.ToString("0.###", CultureInfo.InvariantCulture);

    /// <summary>A number between 0 and a few, in the fixed form of factors in arithmetic.</summary>
    public static string Fixed(double value) => value.ToString("0.000", CultureInfo.InvariantCulture);

    /// <summary>A count, with separators: 41,200.</summary>
    public static string Count(long value) => value.ToString("#,0", CultureInfo.InvariantCulture);

    /// <summary>So many of something: "1 truss", "41,200 trusses".</summary>
    public static string Counted(long value, string one, string many) => $"{Count(value)} {(value == 1 ? one : many)}";

    /// <summary>A length of time, to the second.</summary>
    public static string Duration(TimeSpan time) => time switch
    {
        { TotalSeconds: < 10 } when time.Milliseconds != 0 => string.Create(CultureInfo.InvariantCulture, $"{time.TotalSeconds:0.0} s"),
        { TotalMinutes: < 1 } => string.Create(CultureInfo.InvariantCulture, $"{time.Seconds} s"),
        { TotalHours: < 1 } => string.Create(CultureInfo.InvariantCulture, $"{time.Minutes} min {time.Seconds:00} s"),
        _ => string.Create(CultureInfo.InvariantCulture, $"{(long)time.TotalHours} h {time.Minutes:00} min"),
    };

    /// <summary>An instant, UTC, to the second; empty where there is none.</summary>
    public static string Instant(Google.Protobuf.WellKnownTypes.Timestamp? instant) =>
        instant?.ToDateTime().ToString("yyyy-MM-dd HH:mm:ss", CultureInfo.InvariantCulture) ?? "";

    /// <summary>A catalogue version; a dash where there is none.</summary>
    public static string Version(bool has, long version) => has ? version.ToString(CultureInfo.InvariantCulture) : "-";

    public static string Date(Google.Type.Date date) => string.Create(CultureInfo.InvariantCulture, $"{date.Year:0000}-{date.Month:00}-{date.Day:00}");

    public static string Words(Verdict verdict) => verdict switch
    {
        Verdict.Pass => "PASS",
        Verdict.PassWithConditions => "PASS_WITH_CONDITIONS",
        Verdict.Fail => "FAIL",
        _ => "NOT_ASSESSED",
    };

    public static string Words(StructureState state) => state switch
    {
        StructureState.Unspecified => "not said",
        _ => state.ToString().ToLowerInvariant(),
    };

    public static string Words(PolicyState state) => state switch
    {
        PolicyState.Draft => "draft",
        PolicyState.InForce => "in force",
        PolicyState.Withdrawn => "withdrawn",
        _ => "not said",
    };

    public static string Words(RungOutcome outcome) => outcome switch
    {
        RungOutcome.Passes => "passes",
        RungOutcome.Fails => "fails",
        RungOutcome.Unavailable => "unavailable",
        _ => "not assessed",
    };

    public static string Words(TravelDirection direction) => direction switch
    {
        TravelDirection.Forward => "forward",
        TravelDirection.Reverse => "in reverse",
        _ => "both directions",
    };

    public static string Words(EffectSense sense) => sense switch
    {
        EffectSense.Tension => "tension",
        EffectSense.Compression => "compression",
        EffectSense.Bearing => "bearing",
        EffectSense.Uplift => "uplift",
        EffectSense.Positive => "positive sense",
        _ => "negative sense",
    };

    /// <summary>What governs, for instance "axial force in L2L3, tension, plane north".</summary>
    public static string Words(EffectReference effect) => $"{effect.Description}, {Words(effect.Sense)}, plane {effect.PlaneId}";

    /// <summary>Axles in runs: 1-5, 8.</summary>
    public static string Axles(IReadOnlyList<int> axles)
    {
        var runs = new List<string>();
        for (var i = 0; i < axles.Count;)
        {
            var j = i;
            while (j + 1 < axles.Count && axles[j + 1] == axles[j] + 1)
            {
                j++;
            }

            runs.Add(i == j
                ? axles[i].ToString(CultureInfo.InvariantCulture)
                : string.Create(CultureInfo.InvariantCulture, $"{axles[i]}-{axles[j]}"));
            i = j + 1;
        }

        return runs.Count == 0 ? "none" : string.Join(", ", runs);
    }
}
