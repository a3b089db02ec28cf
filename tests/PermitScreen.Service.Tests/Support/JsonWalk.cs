using System.Globalization;
using System.Text.Json.Nodes;
using System.Text.RegularExpressions;

namespace PermitScreen.Service.Tests.Support;

/// <summary>Walks the JSON form of a screening by paths such as <c>crossings[0].rungs[1].effect(unit,effect,plane,sense).ratingFactor</c>.</summary>
public static partial class JsonWalk
{
    public static JsonNode? At(JsonNode? node, string path)
    {
        foreach (Match step in Steps().Matches(path))
        {
            if (node is null)
            {
                return null;
            }

            node = step.Groups["effect"].Success ? Effect(node, step.Groups["effect"].Value)
                : step.Groups["index"].Success ? Item(node, int.Parse(step.Groups["index"].Value, CultureInfo.InvariantCulture))
                : node[step.Groups["name"].Value];
        }

        return node;
    }

    private static JsonNode? Item(JsonNode list, int index) => list.AsArray() is var items && index < items.Count ? items[index] : null;

    private static JsonNode? Effect(JsonNode rung, string reference)
    {
        var parts = reference.Split(',');
        var all = new[] { rung["governing"] }.Concat(rung["next"]?.AsArray() ?? []);
        return all.FirstOrDefault(e =>
            (string?)e?["effect"]?["unitId"] == parts[0]
            && (string?)e?["effect"]?["effectId"] == parts[1]
            && (string?)e?["effect"]?["planeId"] == parts[2]
            && (string?)e?["effect"]?["sense"] == parts[3]);
    }

    [GeneratedRegex(@"effect\((?<effect>[^)]*)\)|\[(?<index>\d+)\]|(?<name>[A-Za-z]+)", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex Steps();
}
