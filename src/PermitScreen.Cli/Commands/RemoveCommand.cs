using System.CommandLine;
using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;

namespace PermitScreen.Cli.Commands;

/// <summary>Takes a structure out of the catalogue.</summary>
internal static class RemoveCommand
{
    public static Command Create()
    {
        var name = new Argument<string>("structure") { Description = "Structure, for instance structures/P14-0032 or P14-0032." };
        var writing = new WritingOptions();
        var service = new ServiceOptions();
        var command = new Command("remove", "Take a structure out of the catalogue; its revisions are kept.") { name };
        writing.AddTo(command);
        service.AddRecordsTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            var resource = ResourceNames.Structure(parsed.GetValue(name)!);
            if (resource.StartsWith("policies/", StringComparison.Ordinal))
            {
                throw new BadInputException($"{resource} is a policy; a document of it is withdrawn with `policy withdraw`.");
            }

            var request = new DeleteStructureRequest { Name = resource, RequestId = Guid.NewGuid().ToString(), ChangeReason = writing.Reason(parsed) };
            var author = writing.Author(parsed);
            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation);
            var structure = (await connection.Catalogue.GetStructureAsync(new GetStructureRequest { Name = resource }, connection.Call(cancellation))).Structure;
            request.Etag = structure.Etag;
            var answer = await connection.WriteAsync(author, o => connection.Catalogue.DeleteStructureAsync(request, o), cancellation);
            Console.Out.WriteLine(FormattableString.Invariant($"{structure.Name} {structure.Title} (revision of version {structure.CatalogueVersion}, etag {structure.Etag}) is out of the catalogue from version {answer.CatalogueVersion} on. Earlier versions still have it: show {structure.Name} --as-of-version {answer.CatalogueVersion - 1}"));
            return ExitCodes.Passed;
        });
        return command;
    }
}
