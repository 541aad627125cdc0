using System.Runtime.ExceptionServices;

namespace Permute.Engine;

/// <summary>A few threads on the same work; the first fault of any is thrown once all have ended.</summary>
internal static class Crew
{
    /// <summary>Runs <paramref name="work"/> on <paramref name="threads"/> threads, the caller's among them.</summary>
    public static void Run(int threads, Action work)
    {
        ExceptionDispatchInfo? fault = null;
        void Guarded()
        {
            try
            {
                work();
            }
            catch (Exception e)
            {
                Interlocked.CompareExchange(ref fault, ExceptionDispatchInfo.Capture(e), null);
            }
        }
        Thread[] others = [.. Enumerable.Range(1, threads - 1).Select(_ => new Thread(Guarded) { IsBackground = true })];
        foreach (Thread t in others) t.Start();
        Guarded();
        foreach (Thread t in others) t.Join();
        fault?.Throw();
    }
}
