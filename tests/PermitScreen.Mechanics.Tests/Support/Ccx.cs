using System.Diagnostics;
using System.Globalization;
using System.Text;
using PermitScreen.Mechanics.Trusses;

namespace PermitScreen.Mechanics.Tests.Support;

/// <summary>Member forces and reactions of a truss by CalculiX, with its two-node truss elements (T3D2); one load case per step.</summary>
/// <remarks>
/// ccx prints seven digits. The axial force is A times the stress along the bar, from the components printed at the first integration point (the stress
/// of a truss element is uniform). The forces it prints at a held joint are those of the members: the reaction with the load on the joint itself.
/// </remarks>
internal sealed class Ccx
{
    private const double ModulusKnPerM2 = 2e8;

    private readonly TrussModel _model;
    private readonly Dictionary<string, int> _nodes;

    private Ccx(TrussModel model)
    {
        _model = model;
        _nodes = Enumerable.Range(0, model.Nodes.Length).ToDictionary(i => model.Nodes[i].Name, i => i, StringComparer.Ordinal);
    }

    /// <summary>Where ccx is; null where it is not installed.</summary>
    internal static string? Path { get; } = (Environment.GetEnvironmentVariable("PATH") ?? "").Split(System.IO.Path.PathSeparator)
        .Select(folder => System.IO.Path.Combine(folder, "ccx")).FirstOrDefault(File.Exists);

    /// <summary>Results of one load case.</summary>
    internal sealed record Case(double[] AxialKn, double[] ReactionXKn, double[] ReactionYKn);

    /// <summary>Solves for load cases, each the downward loads on joints in kN.</summary>
    internal static Case[] Solve(TrussModel model, IReadOnlyList<Dictionary<string, double>> loads)
    {
        Assert.True(Path is not null, "ccx is needed (Debian package calculix-ccx)");
        var folder = Directory.CreateTempSubdirectory("truss-ccx-");
        try
        {
            var ccx = new Ccx(model);
            File.WriteAllText(System.IO.Path.Combine(folder.FullName, "truss.inp"), ccx.Input(loads));
            using var process = Process.Start(new ProcessStartInfo(Path, "truss")
            {
                WorkingDirectory = folder.FullName,
                RedirectStandardOutput = true,
                UseShellExecute = false,
            })!;
            var said = process.StandardOutput.ReadToEnd();
            process.WaitForExit();
            Assert.True(said.Contains("Job finished", StringComparison.Ordinal), said);
            return ccx.Read(File.ReadAllLines(System.IO.Path.Combine(folder.FullName, "truss.dat")), loads);
        }
        finally
        {
            folder.Delete(recursive: true);
        }
    }

    private string Input(IReadOnlyList<Dictionary<string, double>> loads)
    {
        var text = new StringBuilder("*NODE,NSET=NALL\n");
        for (var i = 0; i < _model.Nodes.Length; i++)
        {
            Line($"{i + 1},{_model.Nodes[i].XM:R},{_model.Nodes[i].YM:R},0");
        }

        for (var m = 0; m < _model.Members.Length; m++)
        {
            Line($"*ELEMENT,TYPE=T3D2,ELSET=E{m + 1}\n{m + 1},{_nodes[_model.Members[m].StartNode] + 1},{_nodes[_model.Members[m].EndNode] + 1}");
        }

        Line($"*MATERIAL,NAME=M\n*ELASTIC\n{ModulusKnPerM2:R},0.3");
        for (var m = 0; m < _model.Members.Length; m++)
        {
            Line($"*SOLID SECTION,ELSET=E{m + 1},MATERIAL=M\n{AreaM2(m):R}");
        }

        Line($"*ELSET,ELSET=EALL,GENERATE\n1,{_model.Members.Length}\n*BOUNDARY\nNALL,3,3");
        foreach (var support in _model.Supports)
        {
            var node = _nodes[support.Node] + 1;
            Line($"{(support.HoldsX ? $"{node},1,1\n" : "")}{(support.HoldsY ? $"{node},2,2" : "")}");
        }

        foreach (var load in loads)
        {
            Line($"*STEP\n*STATIC\n*CLOAD,OP=NEW");
            foreach (var (joint, kn) in load)
            {
                Line($"{_nodes[joint] + 1},2,{-kn:R}");
            }

            Line($"*NODE PRINT,NSET=NALL\nRF\n*EL PRINT,ELSET=EALL\nS\n*END STEP");
        }

        return text.Replace("\n\n", "\n").ToString();

        void Line(FormattableString line) => text.Append(line.ToString(CultureInfo.InvariantCulture)).Append('\n');
    }

    private double AreaM2(int m) => _model.Members[m].AxialStiffnessKn / ModulusKnPerM2;

    private Case[] Read(string[] lines, IReadOnlyList<Dictionary<string, double>> loads)
    {
        var cases = new List<Case>();
        var stresses = false;
        foreach (var line in lines)
        {
            if (line.Contains("forces", StringComparison.Ordinal))
            {
                cases.Add(new Case(new double[_model.Members.Length], new double[_model.Supports.Length], new double[_model.Supports.Length]));
                stresses = false;
            }
            else if (line.Contains("stresses", StringComparison.Ordinal))
            {
                stresses = true;
            }
            else if (line.Split(' ', StringSplitOptions.RemoveEmptyEntries) is { Length: > 3 } cells)
            {
                var numbers = cells.Select(cell => double.Parse(cell, CultureInfo.InvariantCulture)).ToArray();
                Take(cases[^1], numbers, stresses, loads[cases.Count - 1]);
            }
        }

        Assert.Equal(loads.Count, cases.Count);
        return [.. cases];
    }

    private void Take(Case results, double[] numbers, bool stresses, Dictionary<string, double> load)
    {
        if (stresses)
        {
            var m = (int)numbers[0] - 1;
            var (a, b) = (_model.Nodes[_nodes[_model.Members[m].StartNode]], _model.Nodes[_nodes[_model.Members[m].EndNode]]);
            var lengthM = double.Hypot(b.XM - a.XM, b.YM - a.YM);
            var (c, s) = ((b.XM - a.XM) / lengthM, (b.YM - a.YM) / lengthM);
            results.AxialKn[m] = AreaM2(m) * ((numbers[2] * c * c) + (numbers[3] * s * s) + (2 * numbers[5] * c * s));
            return;
        }

        var name = _model.Nodes[(int)numbers[0] - 1].Name;
        for (var i = 0; i < _model.Supports.Length; i++)
        {
            if (_model.Supports[i].Node == name)
            {
                results.ReactionXKn[i] = numbers[1];
                results.ReactionYKn[i] = numbers[2] + load.GetValueOrDefault(name);
            }
        }
    }
}
