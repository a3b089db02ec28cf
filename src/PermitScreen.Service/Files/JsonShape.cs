using System.Text.Json;
using Google.Protobuf.Reflection;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Mapping;

namespace PermitScreen.Service.Files;

/// <summary>Compares a JSON text with a message of the contract: every unknown field and enumeration value at once, with its path and the nearest known name.</summary>
/// <remarks>The parser of the protobuf library refuses them too, but stops at the first and does not say where it stands.</remarks>
internal static class JsonShape
{
    private static readonly JsonDocumentOptions Options = new() { AllowTrailingCommas = false, CommentHandling = JsonCommentHandling.Disallow, MaxDepth = 64 };

    public static void Check(string json, MessageDescriptor descriptor, FaultList faults)
    {
        try
        {
            using var document = JsonDocument.Parse(json, Options);
            Message(document.RootElement, descriptor, faults);
        }
        catch (JsonException error)
        {
            faults.Add("", NotJson.Words(error));
        }
    }

    private static void Message(JsonElement element, MessageDescriptor descriptor, FaultList faults)
    {
        if (element.ValueKind == JsonValueKind.Null)
        {
            return;
        }

        if (element.ValueKind != JsonValueKind.Object)
        {
            faults.Add("", $"Found {Words(element.ValueKind)}; allowed is an object in braces.");
            return;
        }

        var seen = new HashSet<string>(StringComparer.Ordinal);
        foreach (var property in element.EnumerateObject())
        {
            var field = descriptor.Fields.InFieldNumberOrder().FirstOrDefault(f => f.JsonName == property.Name || f.Name == property.Name);
            if (field is null)
            {
                var near = Spelling.Nearest(descriptor.Fields.InFieldNumberOrder().Select(f => f.JsonName), property.Name);
                faults.Add(property.Name, near is null ? "Unknown field." : $"Unknown field; did you mean \"{near}\"?");
                continue;
            }

            if (!seen.Add(field.Name))
            {
                faults.Add(field.Name, "This field stands twice.");
            }

            Field(property.Value, field, faults);
        }
    }

    private static void Field(JsonElement value, FieldDescriptor field, FaultList faults)
    {
        if (!field.IsRepeated)
        {
            Single(value, field, faults.Under(field.Name));
            return;
        }

        if (value.ValueKind != JsonValueKind.Array)
        {
            faults.Add(field.Name, $"Found {Words(value.ValueKind)}; allowed is a list in brackets.");
            return;
        }

        var index = 0;
        foreach (var item in value.EnumerateArray())
        {
            Single(item, field, faults.At(field.Name, index));
            index++;
        }
    }

    private static void Single(JsonElement value, FieldDescriptor field, FaultList at)
    {
        switch (field.FieldType)
        {
            case FieldType.Message:
                Message(value, field.MessageType, at);
                break;
            case FieldType.Enum when value.ValueKind == JsonValueKind.String:
                var name = value.GetString()!;
                if (field.EnumType.FindValueByName(name) is null)
                {
                    var near = Spelling.Nearest(field.EnumType.Values.Select(v => v.Name), name);
                    at.Add("", $"Found \"{name}\"; {(near is null ? $"allowed are {string.Join(", ", field.EnumType.Values.Skip(1).Select(v => v.Name))}." : $"did you mean \"{near}\"?")}");
                }

                break;
            case FieldType.Enum:
                at.Add("", $"Found {Words(value.ValueKind)}; allowed are {string.Join(", ", field.EnumType.Values.Skip(1).Select(v => v.Name))}.");
                break;
            case FieldType.Double:
                if (value.ValueKind != JsonValueKind.Number || !double.IsFinite(value.GetDouble()))
                {
                    at.Add("", $"Found {value.GetRawText()}; allowed is a finite number, without quotes.");
                }

                break;
            case FieldType.Int32 when value.ValueKind != JsonValueKind.Number || !value.TryGetInt32(out _):
                at.Add("", $"Found {value.GetRawText()}; allowed is a whole number.");
                break;
            case FieldType.Bool when value.ValueKind is not (JsonValueKind.True or JsonValueKind.False):
                at.Add("", $"Found {value.GetRawText()}; allowed are true and false.");
                break;
            case FieldType.String when value.ValueKind != JsonValueKind.String:
                at.Add("", $"Found {Words(value.ValueKind)}; allowed is a text in quotes.");
                break;
            default:
                break;
        }
    }

    private static string Words(JsonValueKind kind) => kind switch
    {
        JsonValueKind.Object => "an object",
        JsonValueKind.Array => "a list",
        JsonValueKind.String => "a text",
        JsonValueKind.Number => "a number",
        JsonValueKind.Null => "null",
        _ => "true or false",
    };
}
