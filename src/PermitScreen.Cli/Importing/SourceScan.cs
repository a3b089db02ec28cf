using System.Collections.Immutable;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Importing;

/// <summary>The first look at what is imported: which files, how many items, which fingerprint. Reads one file at a time and keeps none.</summary>
internal static class SourceScan
{
    /// <summary>The files that the user named, each once, in order of name.</summary>
    /// <param name="paths">Files and folders.</param>
    /// <exception cref="FileNotFoundException">There is no such path.</exception>
    /// <exception cref="BadInputException">There is no file in them.</exception>
    public static IReadOnlyList<(string Path, string Name, bool Named)> Files(IEnumerable<string> paths)
    {
        var files = paths
            .SelectMany(path => FolderFiles.Of(path).Select(file => (Path: file, Name: NameOf(path, file), Named: file == path)))
            .DistinctBy(f => Path.GetFullPath(f.Path))
            .OrderBy(f => f.Name, StringComparer.Ordinal).ThenBy(f => Path.GetFullPath(f.Path), StringComparer.Ordinal)
            .ToList();
        return files.Count > 0 ? files : throw new BadInputException("There is no JSON file in what was named.");
    }

    /// <summary>Reads every file once.</summary>
    /// <param name="files">Files.</param>
    /// <param name="progress">Told how many files are read.</param>
    /// <param name="cancellation">Ends the reading between files.</param>
    /// <exception cref="BadInputException">There is nothing to import in them, or a file named by itself is of another kind.</exception>
    public static Source Read(IReadOnlyList<(string Path, string Name, bool Named)> files, Action<long> progress, CancellationToken cancellation)
    {
        var found = ImmutableArray.CreateBuilder<SourceFile>();
        for (var i = 0; i < files.Count; i++)
        {
            cancellation.ThrowIfCancellationRequested();
            var file = Read(files[i].Path, files[i].Name);
            if (file.Kind != SourceKind.Other)
            {
                found.Add(file);
            }
            else if (files[i].Named)
            {
                throw new BadInputException($"{files[i].Path} is {FileSchemas.Kinds[FileSchemas.Application]}; catalogue and policy files can be imported.");
            }

            progress(i + 1);
        }

        return found.Count > 0
            ? new Source(found.ToImmutable(), found.Sum(f => f.Counted), Fingerprint(found))
            : throw new BadInputException("There is no catalogue or policy file in what was named.");
    }

    private static SourceFile Read(string path, string name)
    {
        using var stream = new HashingStream(path);
        var splitter = new StructureSplitter(stream);
        var faults = new FaultList();
        var count = 0;
        var kind = SourceKind.Catalogue;
        try
        {
            while (splitter.TryReadNext(out _))
            {
                count++;
            }

            switch (ContractFile.SchemaOf(splitter.Frame))
            {
                case FileSchemas.Policy:
                    (kind, count) = (SourceKind.Policy, 1);
                    break;
                case FileSchemas.Application:
                    kind = SourceKind.Other;
                    break;
                default:
                    FileSchemas.ReadCatalogue(splitter.Frame, faults);
                    break;
            }
        }
        catch (JsonException error)
        {
            faults.Add("", NotJson.Words(error));
        }
        catch (InvalidDataException error)
        {
            faults.Add("", error.Message);
        }

        return new SourceFile(path, name, kind, count, stream.Finish(), [.. faults.All]);
    }

    /// <summary>SHA-256 over the sorted names and the contents.</summary>
    private static string Fingerprint(IEnumerable<SourceFile> files)
    {
        using var hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        foreach (var file in files)
        {
            // A zero cannot stand in a name, and a hash has one length: two lists of files never give the same bytes.
            hash.AppendData(Encoding.UTF8.GetBytes(file.Name + "\0"));
            hash.AppendData(file.Hash.AsSpan());
        }

        return Convert.ToHexStringLower(hash.GetHashAndReset());
    }

    private static string NameOf(string path, string file) =>
        file == path ? Path.GetFileName(path) : Path.GetRelativePath(path, file).Replace(Path.DirectorySeparatorChar, '/');
}
