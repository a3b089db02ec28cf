using System.Collections;
using System.Globalization;
using Google.Protobuf;
using Google.Protobuf.Reflection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Mapping;

/// <summary>Compares two messages of the contract field by field. Items of a list that have an id are told by it, so that one put in front does not change all.</summary>
internal static class MessageDifferences
{
    private static readonly string[] Ids = ["unit_id", "effect_id", "plane_id", "rung_id", "name", "row_id"];

    /// <summary>What differs, in order of the contract's fields.</summary>
    /// <param name="before">One message; null where there is none.</param>
    /// <param name="after">Another of the same kind; null where there is none.</param>
    public static IEnumerable<FieldDifference> Of(IMessage? before, IMessage? after)
    {
        var found = new List<FieldDifference>();
        var descriptor = (before ?? after)?.Descriptor;
        if (descriptor is not null)
        {
            Compare(descriptor, before, after, "", found);
        }

        return found;
    }

    private static void Compare(MessageDescriptor descriptor, IMessage? before, IMessage? after, string path, List<FieldDifference> found)
    {
        foreach (var field in descriptor.Fields.InFieldNumberOrder())
        {
            var at = path.Length == 0 ? field.Name : $"{path}.{field.Name}";
            if (field.IsRepeated)
            {
                Lists(field, List(field, before), List(field, after), at, found);
            }
            else
            {
                Single(field, Value(field, before), Value(field, after), at, found);
            }
        }
    }

    private static void Single(FieldDescriptor field, object? before, object? after, string at, List<FieldDifference> found)
    {
        if (Equals(before, after))
        {
            return;
        }

        if (field.FieldType == FieldType.Message && before is IMessage old && after is IMessage now)
        {
            Compare(field.MessageType, old, now, at, found);
            return;
        }

        found.Add(new FieldDifference { Field = at, Before = Json(field, before), After = Json(field, after) });
    }

    private static void Lists(FieldDescriptor field, IList? before, IList? after, string at, List<FieldDifference> found)
    {
        var (old, now) = (Keyed(field, before), Keyed(field, after));
        foreach (var key in old.Keys.Union(now.Keys, StringComparer.Ordinal))
        {
            Single(field, old.GetValueOrDefault(key), now.GetValueOrDefault(key), $"{at}[{key}]", found);
        }

        var common = old.Keys.Where(now.ContainsKey);
        if (!common.SequenceEqual(now.Keys.Where(old.ContainsKey), StringComparer.Ordinal))
        {
            found.Add(new FieldDifference { Field = at, Before = $"[{string.Join(", ", old.Keys)}]", After = $"[{string.Join(", ", now.Keys)}]" });
        }
    }

    /// <summary>Items by id where all have different ones, or else by index.</summary>
    private static OrderedDictionary<string, object> Keyed(FieldDescriptor field, IList? items)
    {
        var keyed = new OrderedDictionary<string, object>(StringComparer.Ordinal);
        var id = field.FieldType == FieldType.Message
            ? Ids.Select(field.MessageType.FindFieldByName).FirstOrDefault(f => f is not null && items?.Cast<IMessage>().Select(i => (string)f.Accessor.GetValue(i)).Distinct(StringComparer.Ordinal).Count() == items?.Count)
            : null;
        for (var i = 0; i < (items?.Count ?? 0); i++)
        {
            keyed.Add(id is null ? i.ToString(CultureInfo.InvariantCulture) : (string)id.Accessor.GetValue((IMessage)items![i]!), items![i]!);
        }

        return keyed;
    }

    private static IList? List(FieldDescriptor field, IMessage? message) => message is null ? null : (IList)field.Accessor.GetValue(message);

    private static object? Value(FieldDescriptor field, IMessage? message)
    {
        if (message is null || (field.HasPresence && !field.Accessor.HasValue(message)))
        {
            return null;
        }

        // A field without presence that holds its default was not said.
        var value = field.Accessor.GetValue(message);
        return field.HasPresence ? value : value switch
        {
            "" or false or 0 or 0L or null => null,
            Enum e when Convert.ToInt32(e, CultureInfo.InvariantCulture) == 0 => null,
            _ => value,
        };
    }

    private static string Json(FieldDescriptor field, object? value) => value switch
    {
        null => "",
        IMessage message => JsonFormatter.Default.Format(message),
        string text => System.Text.Json.JsonSerializer.Serialize(text),
        bool flag => flag ? "true" : "false",
        Enum e => $"\"{field.EnumType.FindValueByNumber(Convert.ToInt32(e, CultureInfo.InvariantCulture))?.Name ?? e.ToString()}\"",
        IFormattable number => number.ToString(null, CultureInfo.InvariantCulture),
        _ => value.ToString() ?? "",
    };
}
