using System.Text.RegularExpressions;

namespace PermitScreen.Service.Tests.Contract;

/// <summary>
/// Leading comments of everything that the .proto files declare. Generated code holds no comments, so the text itself is read, line by line; the
/// tests look every descriptor up here, so a declaration that the reader did not understand fails them too.
/// </summary>
internal static partial class ProtoComments
{
    private static readonly Lazy<Dictionary<string, string>> Known = new(Read);

    /// <summary>The comment of a declaration: full name of a message, field, oneof, enumeration, service or method, enumeration/value. Null where there is no such declaration.</summary>
    public static string? Of(string fullName) => Known.Value.GetValueOrDefault(fullName);

    private static Dictionary<string, string> Read()
    {
        var all = new Dictionary<string, string>(StringComparer.Ordinal);
        foreach (var file in Directory.EnumerateFiles(Repository.Path("protos", "permitscreen"), "*.proto", SearchOption.AllDirectories))
        {
            ReadFile(File.ReadAllLines(file), all);
        }

        return all;
    }

    private static void ReadFile(string[] lines, Dictionary<string, string> all)
    {
        var scopes = new Stack<(string Name, string Kind)>();
        scopes.Push(("permitscreen.v1", "package"));
        var comment = new List<string>();
        foreach (var line in lines.Select(l => l.Trim()))
        {
            if (line.StartsWith("//", StringComparison.Ordinal))
            {
                comment.Add(line[2..].Trim());
                continue;
            }

            var (scope, kind) = scopes.Peek();
            var opened = Declaration().Match(line);
            var key = opened.Success ? $"{scope}.{opened.Groups["name"].Value}"
                : kind is "message" or "oneof" && Field().Match(line) is { Success: true } field ? $"{scope}.{field.Groups["name"].Value}"
                : kind == "enum" && Value().Match(line) is { Success: true } value ? $"{scope}/{value.Groups["name"].Value}"
                : null;
            if (key is not null)
            {
                all.Add(key, string.Join(' ', comment));
            }

            var open = line.Count(c => c == '{') - line.Count(c => c == '}');
            for (; open > 0; open--)
            {
                // The fields of a oneof belong to its message.
                scopes.Push(!opened.Success ? (scope, "option")
                    : opened.Groups["kind"].Value == "oneof" ? (scope, "oneof")
                    : (key!, opened.Groups["kind"].Value));
            }

            for (; open < 0; open++)
            {
                scopes.Pop();
            }

            comment.Clear();
        }
    }

    [GeneratedRegex(@"^(?<kind>message|enum|service|oneof|rpc)\s+(?<name>\w+)", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex Declaration();

    [GeneratedRegex(@"^((optional|repeated)\s+)?[\w.]+\s+(?<name>\w+)\s*=\s*\d+", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex Field();

    [GeneratedRegex(@"^(?<name>\w+)\s*=\s*\d+", RegexOptions.ExplicitCapture, 1000)]
    private static partial Regex Value();
}
