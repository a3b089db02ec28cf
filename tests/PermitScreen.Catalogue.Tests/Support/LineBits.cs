using PermitScreen.Mechanics.Lines;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Catalogue.Tests.Support;

/// <summary>Compares lines bit by bit, derived numbers included.</summary>
internal static class LineBits
{
    internal static void AssertSame(TrussLines expected, TrussLines actual)
    {
        Assert.Equal(expected.MemberCount, actual.MemberCount);
        Assert.Equal(expected.SupportCount, actual.SupportCount);
        Assert.Equal(Bits(expected.Quality.LargestResidual), Bits(actual.Quality.LargestResidual));
        Assert.Equal(Bits(expected.Quality.LargestEquilibriumError), Bits(actual.Quality.LargestEquilibriumError));
        Assert.Equal(Bits(expected.Quality.LargestCorrection), Bits(actual.Quality.LargestCorrection));
        for (var m = 0; m < expected.MemberCount; m++)
        {
            AssertSame(expected.Axial(m), actual.Axial(m));
        }

        for (var s = 0; s < expected.SupportCount; s++)
        {
            AssertSame(expected.ReactionX(s), actual.ReactionX(s));
            AssertSame(expected.ReactionY(s), actual.ReactionY(s));
        }
    }

    internal static void AssertSame(InfluenceLine? expected, InfluenceLine? actual)
    {
        if (expected is null || actual is null)
        {
            Assert.Null(expected);
            Assert.Null(actual);
            return;
        }

        Assert.Equal(Bits(expected.XM), Bits(actual.XM));
        Assert.Equal(Bits(expected.LeftOrdinates), Bits(actual.LeftOrdinates));
        Assert.Equal(Bits(expected.RightOrdinates), Bits(actual.RightOrdinates));
        Assert.Equal(
            [Bits(expected.PositiveArea), Bits(expected.NegativeArea), Bits(expected.MaxAbs), Bits(expected.MaxAbsSlope)],
            [Bits(actual.PositiveArea), Bits(actual.NegativeArea), Bits(actual.MaxAbs), Bits(actual.MaxAbsSlope)]);
        Assert.Equal((expected.HasPositive, expected.HasNegative), (actual.HasPositive, actual.HasNegative));
    }

    private static long Bits(double number) => BitConverter.DoubleToInt64Bits(number);

    private static long[] Bits(ReadOnlySpan<double> numbers) => [.. numbers.ToArray().Select(Bits)];
}
