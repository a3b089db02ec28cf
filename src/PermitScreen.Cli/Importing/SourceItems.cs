using System.Text;
using System.Text.Json;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Importing;

/// <summary>Reads the items of an import, one file and one structure at a time, always in the same order.</summary>
internal static class SourceItems
{
    private const string FirstStructure = "structures[0]";

    /// <summary>Every item.</summary>
    /// <param name="source">What is imported.</param>
    /// <exception cref="BadInputException">A file is not any more what it was at the first look.</exception>
    public static IEnumerable<SourceItem> Of(Source source) => source.Files.SelectMany(Of);

    private static IEnumerable<SourceItem> Of(SourceFile file) => file switch
    {
        { Faults.Length: > 0 } => [new SourceItem(file.Name, null, null, file.Faults, file.Counted)],
        { Kind: SourceKind.Policy } => [PolicyOf(file)],
        _ => StructuresOf(file),
    };

    private static SourceItem PolicyOf(SourceFile file)
    {
        using var stream = new HashingStream(file.Path);
        var splitter = new StructureSplitter(stream);
        while (TryReadNext(file, splitter, out _))
        {
        }

        RequireSame(file, stream);
        var faults = new FaultList();
        var policy = FileSchemas.ReadPolicy(splitter.Frame, faults)?.Policy;
        if (policy is null && !faults.Any)
        {
            faults.Add("policy", "Missing; the file holds no policy.");
        }

        return new SourceItem(file.Name, null, policy, [.. faults.All]);
    }

    private static IEnumerable<SourceItem> StructuresOf(SourceFile file)
    {
        using var stream = new HashingStream(file.Path);
        var splitter = new StructureSplitter(stream);
        for (var index = 0; TryReadNext(file, splitter, out var text); index++)
        {
            yield return StructureOf(file, index, Encoding.UTF8.GetString(text.Span));
        }

        RequireSame(file, stream);
    }

    private static SourceItem StructureOf(SourceFile file, int index, string text)
    {
        var at = FormattableString.Invariant($"structures[{index}]");
        var origin = file.ItemCount == 1 ? file.Name : $"{file.Name} {at}";
        var faults = new FaultList();
        var structures = FileSchemas.ReadCatalogue($"{{\"schema\":\"{FileSchemas.Catalogue}\",\"structures\":[{text}]}}", faults)?.Structures;
        if (structures is not { Count: 1 } && !faults.Any)
        {
            faults.Add(FirstStructure, "Missing; give a structure.");
        }

        var told = faults.All.Select(f => f.Path.StartsWith(FirstStructure, StringComparison.Ordinal) ? new Fault(at + f.Path[FirstStructure.Length..], f.Message) : f);
        return new SourceItem(origin, faults.Any ? null : structures![0], null, [.. told]);
    }

    private static bool TryReadNext(SourceFile file, StructureSplitter splitter, out ReadOnlyMemory<byte> text)
    {
        try
        {
            return splitter.TryReadNext(out text);
        }
        catch (Exception error) when (error is JsonException or InvalidDataException)
        {
            // At the first look it was whole.
            throw Changed(file);
        }
    }

    private static void RequireSame(SourceFile file, HashingStream stream)
    {
        if (!stream.Finish().AsSpan().SequenceEqual(file.Hash.AsSpan()))
        {
            throw Changed(file);
        }
    }

    private static BadInputException Changed(SourceFile file) =>
        new($"{file.Path} was changed while it was imported. Nothing was published; run the import again.");
}
