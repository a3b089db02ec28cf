using Google.Protobuf.Reflection;

namespace PermitScreen.Service.Tests.Support;

/// <summary>Values at and beyond the edge of what a field may be.</summary>
public static class ExtremeValues
{
    private static readonly double[] Numbers =
        [double.NaN, double.PositiveInfinity, double.NegativeInfinity, double.MaxValue, double.MinValue, double.Epsilon, -double.Epsilon, 0, -0.0, 1, -1, 1e-12, 1e12, -1e12, 1e150, 0.1, 50];

    private static readonly int[] WholeNumbers = [int.MinValue, int.MaxValue, -1, 0, 1, 2, 9, 10, 99, 100, 1_000_000];

    private static readonly string[] Texts = ["", " ", "a", "structures/P14-0032", "L0", "left", "\0", "\u202e", new string('x', 5_000), "../../etc", "units[0]"];

    /// <summary>A value for a singular field, or null: the field is then to be cleared.</summary>
    public static object? For(FieldDescriptor field, Random random) => field.FieldType switch
    {
        FieldType.Double => Numbers[random.Next(Numbers.Length)],
        FieldType.Int32 => WholeNumbers[random.Next(WholeNumbers.Length)],
        FieldType.Int64 => (long)WholeNumbers[random.Next(WholeNumbers.Length)],
        FieldType.String => Texts[random.Next(Texts.Length)],
        FieldType.Bool => random.Next(2) == 1,
        FieldType.Enum => Enum.ToObject(field.EnumType.ClrType, random.Next(-1, field.EnumType.Values.Count + 1)),
        _ => null,
    };
}
