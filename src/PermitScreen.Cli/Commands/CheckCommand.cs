using System.CommandLine;
using System.Text.Json;
using Google.Rpc;
using Grpc.Core;
using PermitScreen.Cli.Connection;
using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Cli.Commands;

/// <summary>Checks catalogue and policy files as the service would when it reads them.</summary>
internal static class CheckCommand
{
    public static Command Create()
    {
        var paths = new Argument<string[]>("path") { Description = "Catalogue and policy files, or folders of them.", Arity = ArgumentArity.OneOrMore };
        var json = new Option<bool>("--json") { Description = "One JSON object a finding and line, for scripts." };
        var service = new ServiceOptions();
        var command = new Command("check", "Check catalogue and policy files: faults (refused) and gaps (would not be assessed).") { paths, json };
        service.AddTo(command);
        command.SetAction(async (parsed, cancellation) =>
        {
            // Applications last: they may cross structures that are checked beside them.
            var files = parsed.GetValue(paths)!.SelectMany(FolderFiles.Of).Distinct()
                .OrderBy(f => ContractFile.SchemaOf(File.ReadAllText(f)) == FileSchemas.Application).ToList();
            if (files.Count == 0)
            {
                throw new BadInputException("There is no JSON file in what was named.");
            }

            await using var connection = await ServiceConnection.OpenAsync(service, parsed, cancellation, needsCatalogue: false);
            var findings = new Findings(parsed.GetValue(json));
            foreach (var file in files)
            {
                await CheckAsync(file, connection, findings, cancellation);
            }

            findings.Finish(files.Count);
            return findings.Faults > 0 ? ExitCodes.BadInput : findings.Gaps > 0 ? ExitCodes.NotPassed : ExitCodes.Passed;
        });
        return command;
    }

    private static async Task CheckAsync(string file, ServiceConnection connection, Findings findings, CancellationToken cancellation)
    {
        var text = await File.ReadAllTextAsync(file, cancellation);
        var faults = new FaultList();
        switch (ContractFile.SchemaOf(text))
        {
            case FileSchemas.Policy:
                if (FileSchemas.ReadPolicy(text, faults)?.Policy is { } policy)
                {
                    var answer = await connection.Policies.ValidatePolicyAsync(new ValidatePolicyRequest { Policy = policy }, connection.Call(cancellation));
                    findings.Add("fault", file, policy.Name, answer.Faults);
                    if (answer.Faults.Count == 0)
                    {
                        findings.Checked(file, policy.Name, "policy", 0);
                    }
                }

                break;
            case FileSchemas.Application:
                if (FileSchemas.ReadApplication(text, faults)?.Application is { } application)
                {
                    await CheckApplicationAsync(file, application, connection, findings, cancellation);
                }

                break;
            default:
                if (FileSchemas.ReadCatalogue(text, faults) is { } catalogue)
                {
                    foreach (var structure in catalogue.Structures)
                    {
                        var answer = await connection.Catalogue.ValidateStructureAsync(new ValidateStructureRequest { Structure = structure }, connection.Call(cancellation));
                        findings.Add("fault", file, structure.Name, answer.Faults);
                        findings.Add("gap", file, structure.Name, answer.Gaps);
                        findings.AddStructure(file, structure.Name);
                        if (answer.Faults.Count == 0)
                        {
                            findings.Checked(file, structure.Name, FormattableString.Invariant($"{answer.EffectCount} influence lines"), answer.Gaps.Count);
                        }
                    }
                }

                break;
        }

        findings.Add("fault", file, "", faults.All.Select(f => new FieldFault { Field = f.Path, Description = f.Message }));
    }

    private static async Task CheckApplicationAsync(string file, Application application, ServiceConnection connection, Findings findings, CancellationToken cancellation)
    {
        var policies = await connection.Policies.ListPoliciesAsync(new ListPoliciesRequest(), connection.Call(cancellation));
        if (policies.Policies.Count == 0)
        {
            throw new BadInputException("The service has no policy, so that an application cannot be checked.");
        }

        var request = new ScreenApplicationRequest { Application = application, Policy = policies.Policies[0].Name, ValidateOnly = true };
        try
        {
            var answer = await connection.Screening.ScreenApplicationAsync(request, connection.Call(cancellation));
            var gaps = answer.Gaps.Where(g => !findings.Structures.Any(s => g.Description.StartsWith(s + " is not in", StringComparison.Ordinal))).ToList();
            findings.Add("gap", file, application.Reference, gaps);
            findings.Checked(file, application.Reference, "application", gaps.Count);
        }
        catch (RpcException error) when (error.StatusCode == StatusCode.FailedPrecondition)
        {
            // The policy cannot be used today; the application itself was read without fault.
            findings.Checked(file, application.Reference, "application", 0);
        }
        catch (RpcException error) when (error.GetRpcStatus()?.GetDetail<BadRequest>() is not null)
        {
            var details = error.GetRpcStatus()!.GetDetail<BadRequest>()!;
            findings.Add("fault", file, application.Reference, details.FieldViolations.Select(v => new FieldFault { Field = v.Field, Description = v.Description }));
        }
    }

    private sealed class Findings(bool json)
    {
        private readonly HashSet<string> _structures = new(StringComparer.Ordinal);

        public IEnumerable<string> Structures => _structures;

        public int Faults { get; private set; }

        public int Gaps { get; private set; }

        public void Add(string kind, string file, string resource, IEnumerable<FieldFault> found)
        {
            foreach (var finding in found)
            {
                if (kind == "fault")
                {
                    Faults++;
                }
                else
                {
                    Gaps++;
                }

                Console.Out.WriteLine(json
                    ? JsonSerializer.Serialize(new { kind, file, resource, field = finding.Field, description = finding.Description })
                    : $"{kind,-5} {file} {resource} {finding.Field}: {finding.Description}");
            }
        }

        public void Checked(string file, string resource, string what, int gaps)
        {
            if (!json)
            {
                Console.Out.WriteLine(FormattableString.Invariant($"{(gaps == 0 ? "ok" : "read"),-5} {file} {resource}: {what}, {gaps} gaps"));
            }
        }

        /// <summary>Keeps a name, and tells where it stands twice: the service would refuse to start.</summary>
        public void AddStructure(string file, string name)
        {
            if (!_structures.Add(name))
            {
                Add("fault", file, name, [new FieldFault { Field = "structures.name", Description = "This structure stands more than once in what is checked." }]);
            }
        }

        public void Finish(int files)
        {
            if (!json)
            {
                Console.Out.WriteLine(FormattableString.Invariant($"{files} files, {Faults} faults (refused), {Gaps} gaps (would not be assessed)"));
            }
        }
    }
}
