using Google.Protobuf;

namespace PermitScreen.Cli.Printing;

/// <summary>Messages for scripts: one JSON object a line, with every field that is not optional, whatever its value.</summary>
internal static class JsonLines
{
    private static readonly JsonFormatter Formatter = new(JsonFormatter.Settings.Default.WithFormatDefaultValues(true));

    public static void Write(IMessage message) => Console.Out.WriteLine(Formatter.Format(message));

    public static void Write(IEnumerable<IMessage> messages)
    {
        foreach (var message in messages)
        {
            Write(message);
        }
    }
}
