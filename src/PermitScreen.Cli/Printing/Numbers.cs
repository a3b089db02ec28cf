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

    public static string Date(Google.Type.Date date) => string.Create(CultureInfo.InvariantCulture, $"{date.Year:0000}-{date.Month:00}-{date.Day:00}");

    public static string Words(Verdict verdict) => verdict switch
    {
        Verdict.Pass => "PASS",
        Verdict.PassWithConditions => "PASS_WITH_CONDITIONS",
        Verdict.Fail => "FAIL",
        _ => "NOT_ASSESSED",
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
