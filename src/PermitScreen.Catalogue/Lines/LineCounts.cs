namespace PermitScreen.Catalogue.Lines;

/// <summary>What a library did since it was made.</summary>
/// <param name="Solved">Trusses solved; those asked for only to say what is wrong with them do not count.</param>
/// <param name="Read">Blobs read and found sound.</param>
/// <param name="Damaged">Blobs found damaged; none of them was used.</param>
/// <param name="StoreFailures">Times that the store could not be read or written.</param>
/// <param name="MemoryBytes">Memory that lines take now, bytes, about.</param>
public sealed record LineCounts(long Solved, long Read, long Damaged, long StoreFailures, long MemoryBytes);
