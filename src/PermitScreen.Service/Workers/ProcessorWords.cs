using System.Globalization;
using System.Numerics;
using System.Runtime.Intrinsics.X86;

namespace PermitScreen.Service.Workers;

/// <summary>What the processor gives this process, for the log.</summary>
internal static class ProcessorWords
{
    private const int BitsPerByte = 8;

    /// <summary>For instance "vectors of 256 bits, AVX2 yes, AVX-512 no".</summary>
    public static string Text => string.Create(
        CultureInfo.InvariantCulture,
        $"vectors of {Vector<byte>.Count * BitsPerByte} bits, AVX2 {(Avx2.IsSupported ? "yes" : "no")}, AVX-512 {(Avx512F.IsSupported ? "yes" : "no")}");
}
