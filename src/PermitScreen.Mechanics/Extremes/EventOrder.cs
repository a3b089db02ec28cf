namespace PermitScreen.Mechanics.Extremes;

/// <summary>Puts events into order of chainage: they come as runs of one length that are in order already.</summary>
internal static class EventOrder
{
    /// <summary>Merges runs pairwise until one is left.</summary>
    /// <param name="keysM">Chainages, m; length n, runs of <paramref name="run"/> each increasing. Overwritten.</param>
    /// <param name="ids">Number of each event; length n. Overwritten.</param>
    /// <param name="spareKeysM">Room for n chainages.</param>
    /// <param name="spareIds">Room for n numbers.</param>
    /// <param name="run">Length of a run, ≥ 1.</param>
    /// <returns>Whether the result is in the spare room and not in place.</returns>
    /// <remarks>n·log₂(runs) steps. The choice in the inner loop is by arithmetic: which run is next cannot be predicted, and a branch there costs more
    /// than the whole step.</remarks>
    internal static bool Merge(Span<double> keysM, Span<int> ids, Span<double> spareKeysM, Span<int> spareIds, int run)
    {
        var swapped = false;
        for (; run < keysM.Length; run *= 2)
        {
            for (var start = 0; start < keysM.Length; start += 2 * run)
            {
                var middle = Math.Min(start + run, keysM.Length);
                var end = Math.Min(start + (2 * run), keysM.Length);
                MergePair(keysM[start..end], ids[start..end], middle - start, spareKeysM[start..end], spareIds[start..end]);
            }

            var merged = spareKeysM;
            spareKeysM = keysM;
            keysM = merged;
            var mergedIds = spareIds;
            spareIds = ids;
            ids = mergedIds;
            swapped = !swapped;
        }

        return swapped;
    }

    private static void MergePair(ReadOnlySpan<double> keysM, ReadOnlySpan<int> ids, int middle, Span<double> toKeysM, Span<int> toIds)
    {
        int a = 0, b = middle, o = 0;
        while (a < middle && b < keysM.Length)
        {
            var takeB = keysM[b] < keysM[a] ? 1 : 0;
            var from = a + ((b - a) * takeB);
            toKeysM[o] = keysM[from];
            toIds[o] = ids[from];
            a += 1 - takeB;
            b += takeB;
            o++;
        }

        keysM[a..middle].CopyTo(toKeysM[o..]);
        ids[a..middle].CopyTo(toIds[o..]);
        o += middle - a;
        keysM[b..].CopyTo(toKeysM[o..]);
        ids[b..].CopyTo(toIds[o..]);
    }
}
