using PermitScreen.Catalogue.Snapshots;
using PermitScreen.Rating.Checks;
using PermitScreen.Screening.Applications;

namespace PermitScreen.Service.Mapping;

/// <summary>What would keep crossings of an application from being assessed, as far as it can be told without screening.</summary>
internal static class ApplicationGaps
{
    public static IEnumerable<Reason> Of(ApplicationRecord application, CatalogueSnapshot catalogue)
    {
        for (var i = 0; i < application.States.Length; i++)
        {
            var state = application.States[i];
            foreach (var gap in state.Rating.Gaps)
            {
                yield return gap;
            }

            if (state.OverallWidthM is null)
            {
                yield return Missing("The overall width is not stated.", FormattableString.Invariant($"application.configurations[{i}].overall_width_m"));
            }

            if (state.OverallHeightM is null)
            {
                yield return Missing("The overall height is not stated.", FormattableString.Invariant($"application.configurations[{i}].overall_height_m"));
            }
        }

        for (var i = 0; i < application.Crossings.Length; i++)
        {
            if (catalogue.Find(application.Crossings[i].Structure) is null)
            {
                yield return new Reason(
                    ReasonCode.NotInCatalogue,
                    NotInCatalogue.Words(application.Crossings[i].Structure, catalogue),
                    FormattableString.Invariant($"application.route.crossing_list.crossings[{i}].structure"));
            }
        }
    }

    private static Reason Missing(string message, string field) => new(ReasonCode.DataMissing, message, field);
}
