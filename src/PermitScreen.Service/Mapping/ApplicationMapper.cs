using System.Collections.Immutable;
using PermitScreen.Mechanics.Extremes;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Rating.Checks;
using PermitScreen.Rating.Vehicles;
using PermitScreen.Screening.Applications;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads a permit application.</summary>
internal static class ApplicationMapper
{
    private const int MostTrips = 1_000_000;
    private const int FewestOfSeveralTrips = 2;
    private const int MostOfSeveralTrips = 99;

    /// <summary>The application, or null with every fault.</summary>
    /// <param name="application">Application of the contract.</param>
    /// <param name="faults">Takes every fault.</param>
    public static ApplicationRecord? Map(C.Application application, FaultList faults)
    {
        var before = faults.Count;
        var kind = Kind(application, faults);
        var from = Day(application.TravelFrom, "travel_from", faults);
        var to = Day(application.TravelTo, "travel_to", faults);
        if (to < from)
        {
            faults.Add("travel_to", "The last day of travel lies before the first one.");
        }

        var states = !faults.Within("configurations", application.Configurations.Count, Limits.Configurations) ? [] : application.Configurations.Select((c, i) => State(c, i, faults.At("configurations", i))).ToImmutableArray();
        if (application.Configurations.Count == 0)
        {
            faults.Add("configurations", "Missing; give at least one state in which the load travels.");
        }

        foreach (var twice in application.Configurations.GroupBy(c => c.ConfigurationId).Where(g => g.Count() > 1))
        {
            faults.Add("configurations", $"\"{twice.Key}\" names {twice.Count()} configurations; give each an id of its own.");
        }

        var crossings = Crossings(application.Route, faults.Under("route"));
        CheckLegs(application, crossings, faults);
        return faults.Count > before ? null : new ApplicationRecord(application.Reference, kind, from, to, states, crossings);
    }

    private static PermitKind Kind(C.Application application, FaultList faults)
    {
        switch (application.PermitKind)
        {
            case C.PermitKind.Routine:
                faults.Optional("trips", application.HasTrips, application.Trips, 1, MostTrips);
                return PermitKind.Routine;
            case C.PermitKind.SpecialSingleTrip:
                if (faults.Optional("trips", application.HasTrips, application.Trips, 1, MostTrips) is > 1)
                {
                    faults.Add("trips", FormattableString.Invariant($"Found {application.Trips}; a single-trip permit has 1. Ask for PERMIT_KIND_SPECIAL_MULTIPLE_TRIPS instead."));
                }

                return PermitKind.SpecialSingleTrip;
            case C.PermitKind.SpecialMultipleTrips:
                faults.Required("trips", application.HasTrips, application.Trips, FewestOfSeveralTrips, MostOfSeveralTrips);
                return PermitKind.SpecialMultipleTrips;
            default:
                faults.Add("permit_kind", "Missing; say PERMIT_KIND_ROUTINE, PERMIT_KIND_SPECIAL_SINGLE_TRIP or PERMIT_KIND_SPECIAL_MULTIPLE_TRIPS: it selects the live-load factor.");
                return PermitKind.Routine;
        }
    }

    private static DateOnly Day(Google.Type.Date? date, string field, FaultList faults)
    {
        if (date is null)
        {
            faults.Add(field, "Missing; give a civil date with year, month and day.");
        }

        return faults.Date(field, date) ?? default;
    }

    private static TravelState State(C.Configuration configuration, int index, FaultList faults)
    {
        var gaps = new List<Reason>();
        var path = FormattableString.Invariant($"application.configurations[{index}]");
        Names.Id(faults, "configuration_id", configuration.ConfigurationId, "loaded");
        var width = faults.Optional("overall_width_m", configuration.HasOverallWidthM, configuration.OverallWidthM, Allowed.Positive, "m");
        var height = faults.Optional("overall_height_m", configuration.HasOverallHeightM, configuration.OverallHeightM, Allowed.Positive, "m");
        foreach (var train in configuration.Loading?.AxleTrains ?? [])
        {
            if (width is { } overall && train.HasWidthOverTyresM && train.WidthOverTyresM > overall)
            {
                faults.Add("overall_width_m", $"Found {Fields.Text(overall)}; the overall width is not less than the width over tyres, {Fields.Text(train.WidthOverTyresM)} m.");
            }
        }

        PermitVehicle? vehicle = null;
        var loading = configuration.Loading;
        if (loading is null || loading.AxleTrains.Count == 0)
        {
            faults.Under("loading").Add("axle_trains", "Missing; give the axles of the load in this state.");
        }
        else
        {
            vehicle = VehicleMapper.Map(loading.AxleTrains[0], $"{path}.loading.axle_trains[0]", faults.Under("loading").At("axle_trains", 0), gaps);
            for (var i = 1; i < loading.AxleTrains.Count; i++)
            {
                VehicleMapper.Map(loading.AxleTrains[i], FormattableString.Invariant($"{path}.loading.axle_trains[{i}]"), faults.Under("loading").At("axle_trains", i), gaps);
            }

            if (loading.AxleTrains.Count > 1)
            {
                gaps.Add(new Reason(ReasonCode.NotModelled, "Several axle trains in one configuration are not modelled yet.", $"{path}.loading.axle_trains"));
            }

            if (loading.UniformLoad is not null || loading.ConcentratedLoads.Count > 0)
            {
                gaps.Add(new Reason(ReasonCode.NotModelled, "Lane loads in a permit's loading are not modelled yet.", $"{path}.loading"));
            }
        }

        var rating = new PermitConfiguration(configuration.ConfigurationId, gaps.Count == 0 ? vehicle : null, [.. gaps]);
        return new TravelState(configuration.Title, rating, width, height, [.. configuration.LegIds]);
    }

    private static ImmutableArray<Crossing> Crossings(C.Route? route, FaultList faults)
    {
        switch (route?.FormCase ?? C.Route.FormOneofCase.None)
        {
            case C.Route.FormOneofCase.CrossingList:
                var list = faults.Under("crossing_list");
                if (!list.Within("crossings", route!.CrossingList.Crossings.Count, Limits.Crossings))
                {
                    return [];
                }

                if (route.CrossingList.Crossings.Count == 0)
                {
                    list.Add("crossings", "Missing; name at least one structure.");
                }

                return [.. route.CrossingList.Crossings.Select((c, i) => Crossing(c, list.At("crossings", i)))];
            case C.Route.FormOneofCase.RoadStretches:
                faults.Add("road_stretches", "Routes by road and kilometre point are not expanded yet; give crossing_list.");
                return [];
            default:
                faults.Add("", "Missing; give crossing_list with the structures in travel order.");
                return [];
        }
    }

    private static Crossing Crossing(C.Crossing crossing, FaultList faults)
    {
        Names.Structure(faults, "structure", crossing.Structure);
        if (crossing.Relation is not (C.CrossingRelation.On or C.CrossingRelation.Under))
        {
            faults.Add("relation", "Missing; say CROSSING_RELATION_ON (over the structure) or CROSSING_RELATION_UNDER (beneath it).");
        }

        var directions = crossing.Direction switch
        {
            C.TravelDirection.Forward => TravelDirections.Forward,
            C.TravelDirection.Reverse => TravelDirections.Reverse,
            _ => TravelDirections.Both,
        };
        return new Crossing(
            crossing.Structure,
            crossing.Relation == C.CrossingRelation.Under ? CrossingRelation.Under : CrossingRelation.On,
            directions,
            crossing.LegId);
    }

    /// <summary>A leg id that no crossing has is a slip of the pen that would leave a state unscreened.</summary>
    private static void CheckLegs(C.Application application, ImmutableArray<Crossing> crossings, FaultList faults)
    {
        var legs = crossings.Select(c => c.LegId).ToHashSet(StringComparer.Ordinal);
        for (var i = 0; i < application.Configurations.Count; i++)
        {
            for (var j = 0; j < application.Configurations[i].LegIds.Count; j++)
            {
                var leg = application.Configurations[i].LegIds[j];
                if (!legs.Contains(leg))
                {
                    faults.At("configurations", i).Add(FormattableString.Invariant($"leg_ids[{j}]"), $"\"{leg}\" is the leg of no crossing of the route.");
                }
            }
        }
    }
}
