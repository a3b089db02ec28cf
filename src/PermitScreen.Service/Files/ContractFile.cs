using System.Text.Json;
using Google.Protobuf;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Service.Files;

/// <summary>Reads files in the JSON form of the contract's messages.</summary>
public static class ContractFile
{
    private const int MostDepth = 64;
    private static readonly JsonParser Parser = new(JsonParser.Settings.Default.WithRecursionLimit(MostDepth));

    /// <summary>The schema that a text names; empty where it names none or is no JSON.</summary>
    /// <param name="json">Text.</param>
    public static string SchemaOf(string json)
    {
        try
        {
            using var document = JsonDocument.Parse(json);
            return document.RootElement.ValueKind == JsonValueKind.Object
                && document.RootElement.TryGetProperty("schema", out var schema)
                && schema.ValueKind == JsonValueKind.String
                    ? schema.GetString()!
                    : "";
        }
        catch (JsonException)
        {
            return "";
        }
    }

    /// <summary>The message of a text, or null with faults: unknown fields with the nearest known name, wrong values, a wrong schema.</summary>
    /// <typeparam name="T">Kind of file.</typeparam>
    /// <param name="json">Text.</param>
    /// <param name="schema">Schema that the file must name.</param>
    /// <param name="schemaOf">The schema that a message names.</param>
    /// <param name="faults">Takes every fault.</param>
    public static T? Parse<T>(string json, string schema, Func<T, string> schemaOf, FaultList faults)
        where T : class, IMessage<T>, new()
    {
        var before = faults.Count;
        if (SchemaOf(json) is { Length: > 0 } found && found != schema && FileSchemas.Kinds.TryGetValue(found, out var kind))
        {
            faults.Add("schema", $"This is {kind} (\"{found}\"), not {FileSchemas.Kinds[schema]} (\"{schema}\").");
            return null;
        }

        JsonShape.Check(json, new T().Descriptor, faults);
        if (faults.Count > before)
        {
            return null;
        }

        T message;
        try
        {
            message = Parser.Parse<T>(json);
        }
        catch (InvalidProtocolBufferException error)
        {
            faults.Add("", error.Message);
            return null;
        }
        catch (InvalidJsonException error)
        {
            faults.Add("", $"This is not JSON: {error.Message}");
            return null;
        }

        if (schemaOf(message) != schema)
        {
            faults.Add("schema", schemaOf(message).Length == 0
                ? $"Missing; give \"{schema}\"."
                : $"Found \"{schemaOf(message)}\"; this version reads \"{schema}\".");
        }

        return faults.Count > before ? null : message;
    }
}
