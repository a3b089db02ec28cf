using System.CommandLine;
using System.Text;
using PermitScreen.Cli.Connection;
using PermitScreen.Cli.Printing;
using PermitScreen.Contracts.V1;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Commands;

/// <summary>Writes the catalogue to files that `import` reads.</summary>
internal static class ExportCommand
{
    private const int StructuresPerPage = 100;

    public static Command Create()
    {
        var folder = new Argument<string>("folder") { Description = "Folder to write to; made where it does not exist." };
        var asOfVersion = VersionOptions.AsOf();
        var structures = new Option<string[]>("--structure") { Description = "Only these structures; may be given several times.", AllowMultipleArgumentsPerToken = true };
        var overwrite = new Option<bool>("--overwrite") { Description = "Write into a folder that is not empty; files of the same name are replaced." };
        var service = new ServiceOptions();
        var command = new Command("export", "Write structures and policies to files, one each, always the same bytes for the same content.") { folder, asOfVersion, structures, overwrite };
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var target = Folders.Checked("The target", parsed.GetValue(folder)!);
            if (!parsed.GetValue(overwrite) && Directory.Exists(target) && Directory.EnumerateFileSystemEntries(target).Any())
            {
                throw new BadInputException($"{target} is not empty; name another folder, or write into it with --overwrite.");
            }

            var version = VersionOptions.Checked(asOfVersion, parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var export = new Export(connection, target, parsed.GetValue(overwrite));
            var names = parsed.GetValue(structures) ?? [];
            return names.Length > 0
                ? await export.SomeAsync(names.Select(ResourceNames.Structure), version, cancellation)
                : await export.AllAsync(version, cancellation);
        });
        return command;
    }

    private sealed class Export(ServiceConnection connection, string folder, bool overwrite)
    {
        private readonly HashSet<string> _written = new(StringComparer.Ordinal);

        public async Task<int> AllAsync(long? version, CancellationToken cancellation)
        {
            var (structures, listed) = (0, version);
            await ProgressDisplay.RunAsync("Exporting", "structures", null, async progress =>
            {
                await foreach (var page in Listings.StructuresAsync(connection, StructureView.Full, StructuresPerPage, version, cancellation))
                {
                    listed = page.CatalogueVersion;
                    foreach (var structure in page.Structures)
                    {
                        await WriteAsync(structure, cancellation);
                    }

                    structures += page.Structures.Count;
                    progress.Report(structures);
                }

                return structures;
            });

            // The same version as that of the structures, whatever is published meanwhile.
            var policies = await Listings.PoliciesAsync(connection, listed > 0 ? listed : null, cancellation);
            foreach (var policy in policies)
            {
                await WriteAsync("policies", ResourceNames.Of(policy), ContractText.Of(policy), cancellation);
            }

            Console.Out.WriteLine(FormattableString.Invariant($"{Numbers.Counted(structures, "structure", "structures")} and {Numbers.Counted(policies.Count, "policy document", "policy documents")} of catalogue version {listed} written to {folder}"));
            TellOthers();
            return ExitCodes.Passed;
        }

        public async Task<int> SomeAsync(IEnumerable<string> names, long? version, CancellationToken cancellation)
        {
            foreach (var name in names)
            {
                var request = new GetStructureRequest { Name = name };
                if (version is { } asOf)
                {
                    request.AsOfVersion = asOf;
                }

                await WriteAsync((await connection.Catalogue.GetStructureAsync(request, connection.Call(cancellation))).Structure, cancellation);
            }

            Console.Out.WriteLine($"{Numbers.Counted(_written.Count, "structure", "structures")} written to {folder}");
            TellOthers();
            return ExitCodes.Passed;
        }

        private Task WriteAsync(Structure structure, CancellationToken cancellation) => WriteAsync("catalogue", structure.Name, ContractText.Of(structure), cancellation);

        private async Task WriteAsync(string below, string resource, string text, CancellationToken cancellation)
        {
            var path = Path.Combine(folder, below, FileNames.Of(resource));
            Directory.CreateDirectory(Path.GetDirectoryName(path)!);
            await using var file = new TemporaryFile(path);
            await file.Stream.WriteAsync(Encoding.UTF8.GetBytes(text), cancellation);
            file.Keep(overwrite, toDisk: false);
            _written.Add(path);
        }

        /// <summary>What an earlier export left may be out of the catalogue by now, and would come back by an import.</summary>
        private void TellOthers()
        {
            var others = overwrite ? Directory.EnumerateFiles(folder, "*.json", SearchOption.AllDirectories).Count(f => !_written.Contains(f)) : 0;
            if (others > 0)
            {
                Console.Out.WriteLine($"{Numbers.Counted(others, "JSON file", "JSON files")} in the folder are left as they were: not of this export.");
            }
        }
    }
}
