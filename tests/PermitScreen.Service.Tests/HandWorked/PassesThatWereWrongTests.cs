using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Screening.Crossings;
using PermitScreen.Service.Mapping;
using PermitScreen.Service.Tests.Support;
using ReasonCode = PermitScreen.Rating.Checks.ReasonCode;
using Verdict = PermitScreen.Rating.Checks.Verdict;

namespace PermitScreen.Service.Tests.HandWorked;

/// <summary>A regression for each way in which a review made a bridge pass that should not: one change to a case that passes (case 01 or 04).</summary>
public sealed class PassesThatWereWrongTests
{
    private const string WithTraffic = "01-pass-with-traffic";

    [Fact]
    public void A_first_rung_that_is_restricted_gives_a_pass_with_conditions()
    {
        var (application, structures, policy) = ContractFiles.HandWorked("04-passes-at-crawl");
        var crawl = policy.Rungs[3];
        policy.Rungs.Clear();
        policy.Rungs.Add(crawl);

        // A ladder of one rung has no ordinary speed to compare with; its own limit stands.
        Assert.Equal(Verdict.PassWithConditions, Screen(application, structures, policy).Verdict);
    }

    [Fact]
    public void A_vehicle_beyond_the_other_plane_lifts_a_bearing_that_is_not_rated()
    {
        var (application, structures, policy) = ContractFiles.HandWorked(WithTraffic);
        foreach (var plane in structures[0].Units[0].Truss.Planes)
        {
            plane.LateralM /= 4.5;
        }

        // On the centreline the vehicle stays between the planes; anywhere else it does not.
        foreach (var rung in Screen(application, structures, policy).Crossings[0].Ladder!.Rungs.Take(2))
        {
            Assert.NotEqual(Rating.Checks.RungOutcome.Passes, rung.Outcome);
            Assert.Contains(rung.Reasons, r => r.Message.Contains("beyond the other plane", StringComparison.Ordinal));
        }
    }

    [Fact]
    public void A_joint_of_the_deck_that_is_no_panel_point_is_a_gap_unless_it_is_meant()
    {
        var (application, structures, policy) = ContractFiles.HandWorked(WithTraffic);
        var deck = structures[0].Units[0].Truss.Deck;
        var left = deck.PanelPoints[1];
        deck.PanelPoints.RemoveAt(1);
        Assert.Equal(Verdict.NotAssessed, Screen(application, structures, policy).Verdict);
        deck.JointsWithoutFloorBeam.Add(left);
        Assert.True(Screen(application, structures, policy).Verdict.IsPass());
    }

    [Fact]
    public void A_plane_without_a_rated_effect_is_not_assessed()
    {
        var (application, structures, policy) = ContractFiles.HandWorked(WithTraffic);
        foreach (var effect in structures[0].Units[0].Effects)
        {
            effect.NotRated = new NotRated { Reason = "left out" };
        }

        Assert.Equal(Verdict.NotAssessed, Screen(application, structures, policy).Verdict);
    }

    [Theory]
    [InlineData(2026, 9, 2, 24, ReasonCode.DataMissing)] // after the as-of date, 2026-09-01
    [InlineData(2024, 9, 6, 24, ReasonCode.InspectionOverdue)] // due on 2026-09-06, a day before the first day of travel
    public void An_inspection_ahead_of_the_day_or_due_before_travel_is_not_assessed(int year, int month, int day, int months, ReasonCode code)
    {
        var (application, structures, policy) = ContractFiles.HandWorked(WithTraffic);
        structures[0].Inspection.InspectedOn = new Google.Type.Date { Year = year, Month = month, Day = day };
        structures[0].Inspection.IntervalMonths = months;
        var result = Screen(application, structures, policy);
        Assert.Equal(Verdict.NotAssessed, result.Verdict);
        Assert.Contains(result.Crossings[0].Reasons, r => r.Code == code);
    }

    [Theory]
    [InlineData(2026, 9, 2, Verdict.Pass)] // ends between the as-of date and travel
    [InlineData(2026, 9, 7, Verdict.Fail)] // ends on the first day of travel
    public void A_closure_counts_on_the_days_of_travel(int year, int month, int lastDay, Verdict expected)
    {
        var (application, structures, policy) = ContractFiles.HandWorked(WithTraffic);
        structures[0].DatedRestrictions.Add(new DatedRestriction
        {
            From = new Google.Type.Date { Year = 2026, Month = 8, Day = 1 },
            To = new Google.Type.Date { Year = year, Month = month, Day = lastDay },
            State = StructureState.Closed,
            Reason = "works",
        });
        Assert.Equal(expected, Screen(application, structures, policy).Verdict);
    }

    [Fact]
    public void Limits_posted_on_an_open_structure_are_refused()
    {
        var (_, structures, _) = ContractFiles.HandWorked(WithTraffic);
        structures[0].PostedLimits.Add(new PostedLimit { GrossKn = 200 });
        var faults = new FaultList();
        Assert.Null(StructureMapper.Map(structures[0], faults));
        Assert.Contains(faults.All, f => f.Path == "posted_limits");
    }

    [Theory]
    [InlineData(6.0, 2.0, "configurations[0].overall_width_m")] // tyres beyond the overall width
    [InlineData(2.5, 2.6, "configurations[0].loading.axle_trains[0].axles[0].gauge_m")] // wheels beyond the tyres
    public void Widths_that_contradict_each_other_are_refused(double overTyresM, double gaugeM, string field)
    {
        var (application, _, _) = ContractFiles.HandWorked(WithTraffic);
        var train = application.Configurations[0].Loading.AxleTrains[0];
        train.WidthOverTyresM = overTyresM;
        train.Axles[0].GaugeM = gaugeM;
        var faults = new FaultList();
        Assert.Null(ApplicationMapper.Map(application, faults));
        Assert.Contains(faults.All, f => f.Path == field);
    }

    private static RouteResult Screen(Application application, IReadOnlyList<Structure> structures, Policy policy) =>
        new InProcess(application, structures, policy, ContractFiles.HandWorkedDay).Screen();
}
