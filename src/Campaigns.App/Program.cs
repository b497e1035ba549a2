using Campaigns.App.Commands;
using Campaigns.App.Output;

using var stop = new CancellationTokenSource();
Console.CancelKeyPress += (_, pressed) =>
{
    // The first Ctrl-C asks the work to stop cleanly; a second one ends the process, which the catalog survives as well.
    pressed.Cancel = !stop.IsCancellationRequested;
    stop.Cancel();
};
return CommandLine.Run(args, Host.OfProcess(stop.Token));
