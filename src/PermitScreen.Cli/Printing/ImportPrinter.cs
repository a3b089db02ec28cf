using PermitScreen.Cli.Importing;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Printing;

/// <summary>Prints what became of an import.</summary>
/// <param name="json">Whether for scripts: then words for people go to the error output.</param>
internal sealed class ImportPrinter(bool json)
{
    /// <summary>Says something while the import goes on.</summary>
    public void Tell(string words) => (json ? Console.Error : Console.Out).WriteLine(words);

    /// <summary>Prints the end.</summary>
    public void Print(Import import, Refusals refusals)
    {
        if (json)
        {
            JsonLines.Write(refusals.First);
            import = import.Clone();
            import.RefusedCount = refusals.Count;
            JsonLines.Write(import);
            return;
        }

        PrintRefusals(refusals);
        Console.Out.WriteLine(import.State switch
        {
            ImportState.Published => $"{Counts(import, refusals)}; {Version(import)}",
            ImportState.Cancelled => $"Nothing was published: {Numbers.Counted(refusals.Count, "item was", "items were")} refused. Mend that, or publish the rest with --allow-partial. The import was given up.",
            _ => $"Nothing was published: {Numbers.Counted(refusals.Count, "item was", "items were")} refused. {import.Name} is kept as it was staged.",
        });
    }

    private static string Counts(Import import, Refusals refusals) =>
        $"{Numbers.Count(import.AddedCount)} added, {Numbers.Count(import.RevisedCount)} revised, {Numbers.Count(import.UnchangedCount)} unchanged, {Numbers.Count(refusals.Count)} refused";

    private static string Version(Import import) => import.HasPublishedVersion
        ? FormattableString.Invariant($"catalogue version {import.PublishedVersion}")
        : FormattableString.Invariant($"nothing changed; the catalogue stays at version {import.CatalogueVersion}");

    private static void PrintRefusals(Refusals refusals)
    {
        foreach (var refusal in refusals.First)
        {
            foreach (var fault in refusal.Faults)
            {
                var where = string.Join(' ', new[] { refusal.Origin, refusal.Resource, fault.Field }.Where(part => part.Length > 0));
                Console.Out.WriteLine($"refused {where}: {fault.Description}");
            }
        }

        if (refusals.First.Count >= Refusals.Most && refusals.Count > Refusals.Most)
        {
            Console.Out.WriteLine($"These are the first {Refusals.Most}; {Numbers.Count(refusals.Count)} items were refused in all.");
        }
    }
}
