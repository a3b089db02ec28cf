using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads fields of the contract, with a fault for each that is malformed: value found, what is allowed.</summary>
internal static class Fields
{
    private const int EarliestYear = 1800;
    private const int LatestYear = 2200;

    /// <summary>A length or position that may be absent, within what a structure can have.</summary>
    public static double? Within(this FaultList faults, string field, bool has, double value, double most)
    {
        var number = faults.Optional(field, has, value, Allowed.Any, "m");
        if (number is { } found && Math.Abs(found) > most)
        {
            faults.Add(field, $"Found {Text(found)}; allowed is -{Text(most)} to {Text(most)}, m.");
            return null;
        }

        return number;
    }

    /// <summary>A number that may be absent; null also where it is malformed.</summary>
    public static double? Optional(this FaultList faults, string field, bool has, double value, Allowed allowed, string unit)
    {
        if (!has)
        {
            return null;
        }

        if (allowed.Holds(value))
        {
            return value;
        }

        faults.Add(field, $"Found {Text(value)}; allowed is {allowed.Words(value)}, {unit}.");
        return null;
    }

    /// <summary>A number that must be there.</summary>
    public static double Required(this FaultList faults, string field, bool has, double value, Allowed allowed, string unit)
    {
        if (!has)
        {
            faults.Add(field, $"Missing; give {allowed.Words(0)}, {unit}.");
            return double.NaN;
        }

        return faults.Optional(field, has, value, allowed, unit) ?? double.NaN;
    }

    /// <summary>A length or position that must be there, within what a structure can have.</summary>
    public static double Required(this FaultList faults, string field, bool has, double value, double most)
    {
        if (!has)
        {
            faults.Add(field, $"Missing; give a number from -{Text(most)} to {Text(most)}, m.");
        }

        return faults.Within(field, has, value, most) ?? double.NaN;
    }

    /// <summary>A whole number that may be absent.</summary>
    public static int? Optional(this FaultList faults, string field, bool has, int value, int least, int most)
    {
        if (!has)
        {
            return null;
        }

        if (value >= least && value <= most)
        {
            return value;
        }

        faults.Add(field, string.Create(CultureInfo.InvariantCulture, $"Found {value}; allowed is a whole number from {least} to {most}."));
        return null;
    }

    /// <summary>A whole number that must be there.</summary>
    public static int Required(this FaultList faults, string field, bool has, int value, int least, int most)
    {
        if (!has)
        {
            faults.Add(field, string.Create(CultureInfo.InvariantCulture, $"Missing; give a whole number from {least} to {most}."));
            return least;
        }

        return faults.Optional(field, has, value, least, most) ?? least;
    }

    /// <summary>A text that must not be empty.</summary>
    public static string Text(this FaultList faults, string field, string value, string example)
    {
        if (string.IsNullOrWhiteSpace(value))
        {
            faults.Add(field, $"Missing; give {example}.");
        }

        return value;
    }

    /// <summary>A civil date that may be absent.</summary>
    public static DateOnly? Date(this FaultList faults, string field, Google.Type.Date? date)
    {
        if (date is null)
        {
            return null;
        }

        if (date.Year is >= EarliestYear and <= LatestYear && date.Month is >= 1 and <= 12 && date.Day >= 1 && date.Day <= DateTime.DaysInMonth(date.Year, date.Month))
        {
            return new DateOnly(date.Year, date.Month, date.Day);
        }

        faults.Add(field, string.Create(CultureInfo.InvariantCulture, $"Found {date.Year}-{date.Month}-{date.Day}; allowed is a civil date with year ({EarliestYear} to {LatestYear}), month and day."));
        return null;
    }

    /// <summary>A civil date of the contract.</summary>
    public static Google.Type.Date ToContract(this DateOnly date) => new() { Year = date.Year, Month = date.Month, Day = date.Day };

    /// <summary>A number as a person would write it.</summary>
    public static string Text(double value) => value.ToString("R", CultureInfo.InvariantCulture);
}
