using System.Text.Json;

namespace PermitScreen.Service.Files;

/// <summary>Says why a text is not JSON.</summary>
public static class NotJson
{
    /// <summary>Words for people: line, byte, what is wrong there, and a hint where a decimal comma may be the cause.</summary>
    /// <param name="error">What the reader says.</param>
    public static string Words(JsonException error)
    {
        var hint = error.Message.Contains("start of a property name", StringComparison.Ordinal) || error.Message.Contains("is invalid after a value", StringComparison.Ordinal)
            ? " Numbers take a decimal point, not a comma: 49.5."
            : "";
        return FormattableString.Invariant($"This is not JSON: line {error.LineNumber + 1}, byte {error.BytePositionInLine + 1}: {error.Message.Split(" LineNumber")[0]}{hint}");
    }
}
