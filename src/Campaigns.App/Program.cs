using System.Runtime.InteropServices;
using Campaigns.App.Commands;
using Campaigns.App.Output;

using var stop = new CancellationTokenSource();
int stoppedCode = ExitCode.Stopped;
using PosixSignalRegistration interrupt = Heed(PosixSignal.SIGINT, 130), hangUp = Heed(PosixSignal.SIGHUP, 129), terminate = Heed(PosixSignal.SIGTERM, 143);
return CommandLine.Run(args, Host.OfProcess(() => stoppedCode, stop.Token));

// The first signal asks the work to stop cleanly; a second one ends the process, which the catalog survives as well.
PosixSignalRegistration Heed(PosixSignal signal, int code) => PosixSignalRegistration.Create(signal, context =>
{
    context.Cancel = !stop.IsCancellationRequested;
    if (context.Cancel)
    {
        stoppedCode = code;
        stop.Cancel();
    }
});
