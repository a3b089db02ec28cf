using PermitScreen.Contracts.V1;
using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;
using PermitScreen.Service.Revisions;

namespace PermitScreen.Service.Workers;

/// <summary>Reads policies from files.</summary>
public static class PolicyLoader
{
    /// <summary>Every policy document of the paths.</summary>
    /// <param name="paths">Files or folders.</param>
    /// <exception cref="FileFaultsException">Any file is at fault; all faults of all files are told.</exception>
    public static IReadOnlyList<Policy> Load(IReadOnlyList<string> paths)
    {
        var policies = new List<Policy>();
        var faulty = new List<(string File, Fault Fault)>();
        foreach (var path in paths.SelectMany(p => FolderFiles.Of(p, FileSchemas.Policy)))
        {
            var faults = new FaultList();
            if (FileSchemas.ReadPolicy(File.ReadAllText(path), faults)?.Policy is { } policy)
            {
                if (Door.Policy(policy, faults.Under("policy")) is not null)
                {
                    policies.Add(policy);
                }
            }
            else if (!faults.Any)
            {
                faults.Add("policy", "Missing; the file holds no policy.");
            }

            faulty.AddRange(faults.All.Select(f => (path, f)));
        }

        foreach (var twice in policies.GroupBy(CanonicalForm.DocumentName).Where(g => g.Count() > 1))
        {
            faulty.Add((string.Join(", ", paths), new Fault("policy.name", $"{twice.Key} stands in {twice.Count()} files.")));
        }

        return faulty.Count > 0 ? throw new FileFaultsException(faulty) : policies;
    }
}
