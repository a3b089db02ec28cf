using System.Collections;
using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using Google.Api;
using Google.Protobuf;
using Google.Protobuf.Reflection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Files;

/// <summary>
/// Writes files in the JSON form of the contract's messages, always the same bytes for the same content: fields in order of their numbers, two
/// spaces a level, line feeds, numbers in the shortest form that reads back as the same bits. Fields that the service sets (etag, catalogue
/// version) are left out. An object or list of plain values stands on one line where it fits.
/// </summary>
public static class ContractText
{
    private const int LongestLine = 120;
    private const int IndentPerLevel = 2;

    // Titles in any script stay readable; quotes, backslashes and control characters are still escaped.
    private static readonly JsonSerializerOptions Strings = new() { Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>A catalogue file with one structure.</summary>
    /// <param name="structure">Structure.</param>
    public static string Of(Structure structure) => Of(new CatalogueFile { Schema = FileSchemas.Catalogue, Structures = { structure } });

    /// <summary>A policy file.</summary>
    /// <param name="policy">Policy document.</param>
    public static string Of(Policy policy) => Of(new PolicyFile { Schema = FileSchemas.Policy, Policy = policy });

    /// <summary>A file, ending with a line feed.</summary>
    /// <param name="file">Message.</param>
    /// <exception cref="NotSupportedException">A field is of a kind that no file of this contract has (map, bytes).</exception>
    public static string Of(IMessage file) => new StringBuilder().Append(Object(file, 0)).Append('\n').ToString();

    private static string Object(IMessage message, int level)
    {
        var fields = message.Descriptor.Fields.InFieldNumberOrder()
            .Where(f => IsPresent(message, f) && !IsOutputOnly(f))
            .Select(f => $"{Text(f.JsonName)}: {Value(f, f.Accessor.GetValue(message), level + 1)}")
            .ToList();
        return Joined('{', fields, '}', level);
    }

    private static string Value(FieldDescriptor field, object value, int level) => field switch
    {
        { IsMap: true } => throw new NotSupportedException($"{field.FullName} is a map."),
        { IsRepeated: true } => Joined('[', [.. ((IList)value).Cast<object>().Select(item => Single(field, item, level + 1))], ']', level),
        _ => Single(field, value, level),
    };

    private static string Single(FieldDescriptor field, object value, int level) => field.FieldType switch
    {
        FieldType.Message => Object((IMessage)value, level),
        FieldType.Enum => field.EnumType.FindValueByNumber((int)value) is { } named ? Text(named.Name) : ((int)value).ToString(CultureInfo.InvariantCulture),
        FieldType.String => Text((string)value),
        FieldType.Bool => (bool)value ? "true" : "false",
        FieldType.Double => ((double)value).ToString("R", CultureInfo.InvariantCulture),
        FieldType.Int32 => ((int)value).ToString(CultureInfo.InvariantCulture),
        _ => throw new NotSupportedException($"{field.FullName} is of kind {field.FieldType}."),
    };

    /// <summary>On one line where all parts are plain and it fits, or else a line a part.</summary>
    private static string Joined(char open, List<string> parts, char close, int level)
    {
        if (parts.Count == 0)
        {
            return $"{open}{close}";
        }

        var length = (level * IndentPerLevel) + parts.Sum(p => p.Length + 2);
        var plain = parts.All(p => !p.Contains('\n', StringComparison.Ordinal) && !p.EndsWith('}') && !p.EndsWith(']'));
        if (plain && length <= LongestLine)
        {
            return $"{open}{string.Join(", ", parts)}{close}";
        }

        var indent = new string(' ', (level + 1) * IndentPerLevel);
        return $"{open}\n{indent}{string.Join($",\n{indent}", parts)}\n{new string(' ', level * IndentPerLevel)}{close}";
    }

    private static bool IsPresent(IMessage message, FieldDescriptor field) => field switch
    {
        { IsRepeated: true } => ((ICollection)field.Accessor.GetValue(message)).Count > 0,
        { HasPresence: true } => field.Accessor.HasValue(message),
        _ => field.Accessor.GetValue(message) is not ("" or false or 0 or 0L or 0.0) and var value && (field.FieldType != FieldType.Enum || (int)value != 0),
    };

    private static bool IsOutputOnly(FieldDescriptor field) =>
        field.GetOptions()?.GetExtension(FieldBehaviorExtensions.FieldBehavior)?.Contains(FieldBehavior.OutputOnly) ?? false;

    private static string Text(string value) => JsonSerializer.Serialize(value, Strings);
}
