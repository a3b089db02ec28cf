using System.CommandLine;
using System.Text;
using Grpc.Core;
using PermitScreen.Catalogue.Storage;
using PermitScreen.Cli;
using PermitScreen.Cli.Commands;
using PermitScreen.Cli.Printing;
using PermitScreen.Host;
using PermitScreen.Service.Files;

Console.OutputEncoding = Encoding.UTF8;
var root = new RootCommand("PermitScreen: screens overweight vehicles against the bridges of a route. Exit codes: 0 passed or done, 1 not passed, 2 bad input, 3 no answer.")
{
    DemoCommand.Create(),
    ScreenCommand.Create(),
    CheckCommand.Create(),
    ListCommand.Create(),
    ShowCommand.Create(),
    ImportCommand.Create(),
    ExportCommand.Create(),
    RemoveCommand.Create(),
    PolicyCommand.Create(),
    HistoryCommand.Create(),
    CompareCommand.Create(),
    ChangesCommand.Create(),
    AuditCommand.Create(),
    VerifyCommand.Create(),
    BacklogCommand.Create(),
    CollectCommand.Create(),
    BackupCommand.Create(),
    RestoreCommand.Create(),
    ServeCommand.Create(),
};
var parsed = root.Parse(args);
if (parsed.Errors.Count > 0)
{
    foreach (var error in parsed.Errors)
    {
        await Console.Error.WriteLineAsync(error.Message);
    }

    await Console.Error.WriteLineAsync("Add --help to see what is allowed.");
    return ExitCodes.BadInput;
}

try
{
    return await parsed.InvokeAsync(new InvocationConfiguration
    {
        EnableDefaultExceptionHandler = false,

        // A signal ends the command; the service gets its time to stop before the process is torn down.
        ProcessTerminationTimeout = ServiceHost.TimeToStop + TimeSpan.FromSeconds(3),
    });
}
catch (BadInputException error)
{
    await Console.Error.WriteLineAsync(error.Message);
    return ExitCodes.BadInput;
}
catch (FileFaultsException error)
{
    await Console.Error.WriteLineAsync(error.Message);
    return ExitCodes.BadInput;
}
catch (StoreException error)
{
    await Console.Error.WriteLineAsync(error.Message);
    return error.Trouble is StoreTrouble.Locked or StoreTrouble.NewerSchema or StoreTrouble.NotAllowed or StoreTrouble.Damaged or StoreTrouble.Other ? ExitCodes.BadInput : ExitCodes.NoAnswer;
}
catch (Exception error) when (error is IOException or UnauthorizedAccessException)
{
    await Console.Error.WriteLineAsync(error.Message);
    return ExitCodes.BadInput;
}
catch (RpcException error)
{
    return await ErrorPrinter.PrintAsync(error);
}
catch (OperationCanceledException)
{
    await Console.Error.WriteLineAsync("Cancelled; no verdict was given.");
    return ExitCodes.NoAnswer;
}
