using Spectre.Console;
using Spectre.Console.Rendering;

namespace PermitScreen.Cli.Printing;

/// <summary>Column of a progress bar: done of all, rate, time left.</summary>
/// <param name="report">How far the work is.</param>
internal sealed class ProgressWordsColumn(ProgressReport report) : ProgressColumn
{
    protected override bool NoWrap => true;

    public override IRenderable Render(RenderOptions options, ProgressTask task, TimeSpan deltaTime) => new Text(report.Words);
}
