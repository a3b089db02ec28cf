namespace PermitScreen.Catalogue.Records;

/// <summary>A restriction for a stretch of time.</summary>
/// <param name="From">First day; null means from always.</param>
/// <param name="To">Last day; null means until further notice.</param>
/// <param name="State">State in that time; null where not said.</param>
/// <param name="Reason">Words for people.</param>
public sealed record DatedRestriction(DateOnly? From, DateOnly? To, StructureState? State, string Reason)
{
    /// <summary>Whether it holds on any day of a stretch.</summary>
    /// <param name="first">First day.</param>
    /// <param name="last">Last day.</param>
    public bool HoldsWithin(DateOnly first, DateOnly last) => (From is not { } from || from <= last) && (To is not { } to || to >= first);
}
