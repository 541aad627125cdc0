using System.Runtime.InteropServices;

namespace Permute.Cli;

/// <summary>
/// Turns Ctrl-C and SIGTERM into a cancellation, so that the work ends in peace. Asked a second time, the process ends at once.
/// </summary>
internal sealed class StopSignals : IDisposable
{
    private readonly CancellationTokenSource source = new();
    private readonly PosixSignalRegistration[] registrations;

    public StopSignals() => registrations =
        [PosixSignalRegistration.Create(PosixSignal.SIGINT, Stop), PosixSignalRegistration.Create(PosixSignal.SIGTERM, Stop)];

    public CancellationToken Token => source.Token;

    public void Dispose()
    {
        foreach (PosixSignalRegistration registration in registrations) registration.Dispose();
        source.Dispose();
    }

    private void Stop(PosixSignalContext signal)
    {
        signal.Cancel = !source.IsCancellationRequested;
        source.Cancel();
    }
}
