namespace PermitScreen.Rating.Structures;

/// <summary>What an effect states of its own, beside what is stated for the whole it belongs to.</summary>
/// <typeparam name="T">What is stated.</typeparam>
/// <param name="Own">The effect's own; null where it states none.</param>
/// <param name="OfWhole">That of its unit or structure; null where none is stated.</param>
public readonly record struct Stated<T>(T? Own, T? OfWhole)
    where T : struct
{
    /// <summary>What holds for the effect; null where nothing is stated.</summary>
    public T? Value => Own ?? OfWhole;
}
