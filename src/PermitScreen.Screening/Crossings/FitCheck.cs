using System.Collections.Immutable;
using PermitScreen.Catalogue.Records;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Policies;
using PermitScreen.Screening.Applications;

namespace PermitScreen.Screening.Crossings;

/// <summary>Whether vehicle and load fit past a structure in height and width (rule F3).</summary>
public static class FitCheck
{
    /// <summary>Adds what does not fit.</summary>
    /// <param name="clearance">Room on this way past the structure; null where not said.</param>
    /// <param name="field">Field of the clearance.</param>
    /// <param name="states">States in which the load passes.</param>
    /// <param name="rules">Margins of the policy.</param>
    /// <param name="findings">Takes what is found.</param>
    public static void Of(Clearance? clearance, string field, ImmutableArray<TravelState> states, StandingRules rules, Findings findings)
    {
        if (clearance is null)
        {
            findings.NotAssessed(ReasonCode.DataMissing, "The clearances are not in the catalogue; give height and width, or state that there is no limit with the reason.", field);
            return;
        }

        if (clearance.HasProfile)
        {
            findings.NotAssessed(ReasonCode.NotModelled, "A clearance profile is not modelled yet.", $"{field}.profile");
        }

        Check(clearance.Height, rules.HeightMarginM, states, s => s.OverallHeightM, ReasonCode.Height, "high", "height", $"{field}.height_m", findings);
        Check(clearance.Width, rules.WidthMarginM, states, s => s.OverallWidthM, ReasonCode.Width, "wide", "width", $"{field}.width_m", findings);
    }

    private static void Check(
        ClearLimit limit,
        double marginM,
        ImmutableArray<TravelState> states,
        Func<TravelState, double?> size,
        ReasonCode code,
        string adjective,
        string noun,
        string field,
        Findings findings)
    {
        if (!limit.Stated)
        {
            findings.NotAssessed(ReasonCode.DataMissing, $"The clear {noun} is not in the catalogue; give it, or state that there is no limit with the reason.", field);
        }

        foreach (var state in states)
        {
            if (size(state) is not { } sizeM)
            {
                // Told even where the structure has no limit: an application without its size is incomplete on every structure alike.
                findings.NotAssessed(ReasonCode.DataMissing, $"The overall {noun} of configuration {state.Rating.ConfigurationId} is not stated.", $"application.configurations.overall_{noun}_m");
            }
            else if (limit.LimitM is { } limitM && sizeM > limitM - marginM)
            {
                findings.Fail(code, FormattableString.Invariant($"Configuration {state.Rating.ConfigurationId} is {sizeM:0.00} m {adjective}; clear are {limitM:0.00} m less the policy's margin of {marginM:0.00} m."), field);
            }
        }
    }
}
