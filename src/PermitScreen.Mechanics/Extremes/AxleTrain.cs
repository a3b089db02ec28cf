using System.Globalization;
using PermitScreen.Mechanics.Faults;

namespace PermitScreen.Mechanics.Extremes;

/// <summary>The axles of one vehicle, from the lead axle backwards.</summary>
/// <remarks>
/// Axle i carries P_i kN and stands d_i metres behind the lead axle: d_0 = 0, not decreasing. Loads of a checked train are &gt; 0; a trusted
/// train may carry weights of any sign (an axle's share on one plane). Immutable, never empty.
/// </remarks>
public sealed class AxleTrain
{
    private readonly double[] _loadsKn;
    private readonly double[] _offsetsM;

    private AxleTrain(double[] loadsKn, double[] offsetsM)
    {
        _loadsKn = loadsKn;
        _offsetsM = offsetsM;
        foreach (var load in loadsKn)
        {
            GrossKn += load;
            SumAbsLoadsKn += Math.Abs(load);
            HasNegativeLoad |= load < 0;
        }
    }

    /// <summary>Axle loads, kN; length <see cref="Count"/>, lead axle first.</summary>
    public ReadOnlySpan<double> LoadsKn => _loadsKn;

    /// <summary>Distance of each axle behind the lead axle, m; length <see cref="Count"/>, first 0, not decreasing.</summary>
    public ReadOnlySpan<double> OffsetsM => _offsetsM;

    /// <summary>Number of axles, ≥ 1.</summary>
    public int Count => _loadsKn.Length;

    /// <summary>Distance from the lead axle to the last one, m.</summary>
    public double LengthM => _offsetsM[^1];

    /// <summary>Sum of the axle loads, kN.</summary>
    public double GrossKn { get; }

    /// <summary>Sum of the absolute axle loads, kN.</summary>
    internal double SumAbsLoadsKn { get; }

    /// <summary>Whether some load is below zero.</summary>
    internal bool HasNegativeLoad { get; }

    /// <summary>Checks an axle list and makes a train of it.</summary>
    /// <param name="loadsKn">Axle loads, kN; length n ≥ 1, each finite and &gt; 0.</param>
    /// <param name="offsetsM">Distance behind the lead axle, m; length n, first 0, finite, not decreasing.</param>
    /// <param name="faults">Every fault found is added under <c>axles[i].load_kn</c> or <c>axles[i].offset_m</c>; none is thrown.</param>
    /// <returns>The train, or <see langword="null"/> if a fault was added.</returns>
    public static AxleTrain? TryCreate(ReadOnlySpan<double> loadsKn, ReadOnlySpan<double> offsetsM, FaultList faults)
    {
        var before = faults.Count;
        if (loadsKn.Length == 0)
        {
            faults.Add("axles", "a vehicle needs at least one axle");
        }

        if (loadsKn.Length != offsetsM.Length)
        {
            faults.Add("axles", string.Create(CultureInfo.InvariantCulture, $"each axle needs a load and an offset; found {loadsKn.Length} loads and {offsetsM.Length} offsets"));
        }

        for (var i = 0; i < loadsKn.Length; i++)
        {
            if (!(loadsKn[i] > 0 && double.IsFinite(loadsKn[i])))
            {
                faults.At("axles", i).Add("load_kn", string.Create(CultureInfo.InvariantCulture, $"found {loadsKn[i]}; must be finite and above 0"));
            }
        }

        for (var i = 0; i < offsetsM.Length; i++)
        {
            CheckOffset(offsetsM, i, faults.At("axles", i));
        }

        return faults.Count > before ? null : new AxleTrain(loadsKn.ToArray(), offsetsM.ToArray());
    }

    /// <summary>Makes a train of weights that are known to be right.</summary>
    /// <param name="loadsKn">Axle weights, kN, of any sign; length n ≥ 1, finite.</param>
    /// <param name="offsetsM">Distance behind the lead axle, m; length n, first 0, finite, not decreasing.</param>
    /// <exception cref="ArgumentException">No axle, or the lengths differ. Values are not checked.</exception>
    public static AxleTrain FromTrusted(ReadOnlySpan<double> loadsKn, ReadOnlySpan<double> offsetsM)
    {
        if (loadsKn.Length == 0 || loadsKn.Length != offsetsM.Length)
        {
            throw new ArgumentException($"each axle needs a load and an offset; found {loadsKn.Length} loads and {offsetsM.Length} offsets", nameof(loadsKn));
        }

        return new AxleTrain(loadsKn.ToArray(), offsetsM.ToArray());
    }

    /// <summary>The train with every load multiplied by a factor.</summary>
    /// <param name="factor">Finite factor of any sign.</param>
    public AxleTrain ScaledBy(double factor) => new(Array.ConvertAll(_loadsKn, load => load * factor), _offsetsM);

    /// <summary>The same axles with other weights.</summary>
    /// <param name="loadsKn">Axle weights, kN, of any sign; length <see cref="Count"/>, finite.</param>
    /// <exception cref="ArgumentException">The length differs.</exception>
    public AxleTrain WithLoads(ReadOnlySpan<double> loadsKn) => loadsKn.Length == Count
        ? new AxleTrain(loadsKn.ToArray(), _offsetsM)
        : throw new ArgumentException($"the train has {Count} axles; found {loadsKn.Length} loads", nameof(loadsKn));

    private static void CheckOffset(ReadOnlySpan<double> offsetsM, int i, FaultList faults)
    {
        if (!double.IsFinite(offsetsM[i]))
        {
            faults.Add("offset_m", string.Create(CultureInfo.InvariantCulture, $"found {offsetsM[i]}; must be finite"));
        }
        else if (i == 0 && offsetsM[0] != 0)
        {
            faults.Add("offset_m", string.Create(CultureInfo.InvariantCulture, $"found {offsetsM[0]}; the lead axle's offset must be 0"));
        }
        else if (i > 0 && offsetsM[i] < offsetsM[i - 1])
        {
            faults.Add("offset_m", string.Create(CultureInfo.InvariantCulture, $"found {offsetsM[i]} behind {offsetsM[i - 1]}; offsets must not decrease"));
        }
    }
}
