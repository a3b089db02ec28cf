using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Mapping;

/// <summary>Reads fields of the contract, with a fault for each that is malformed: value found, what is allowed.</summary>
internal static class Fields
{
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

        faults.Add(field, $"Found {Text(value)}; allowed is {allowed.Words()}, {unit}.");
        return null;
    }

    /// <summary>A number that must be there.</summary>
    public static double Required(this FaultList faults, string field, bool has, double value, Allowed allowed, string unit)
    {
        if (!has)
        {
            faults.Add(field, $"Missing; give {allowed.Words()}, {unit}.");
            return double.NaN;
        }

        return faults.Optional(field, has, value, allowed, unit) ?? double.NaN;
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

        if (date.Year is >= 1 and <= 9999 && date.Month is >= 1 and <= 12 && date.Day >= 1 && date.Day <= DateTime.DaysInMonth(date.Year, date.Month))
        {
            return new DateOnly(date.Year, date.Month, date.Day);
        }

        faults.Add(field, string.Create(CultureInfo.InvariantCulture, $"Found {date.Year}-{date.Month}-{date.Day}; allowed is a civil date with year, month and day."));
        return null;
    }

    /// <summary>A civil date of the contract.</summary>
    public static Google.Type.Date ToContract(this DateOnly date) => new() { Year = date.Year, Month = date.Month, Day = date.Day };

    /// <summary>A number as a person would write it.</summary>
    public static string Text(double value) => value.ToString("R", CultureInfo.InvariantCulture);
}
