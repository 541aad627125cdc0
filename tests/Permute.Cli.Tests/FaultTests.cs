using Permute.Nifti;

namespace Permute.Cli.Tests;

public class FaultTests
{
    public static TheoryData<Exception, int> Faults => new()
    {
        { new InputException("one\ntwo"), 3 },
        { new NiftiException("a file"), 3 },
        { new IOException("No space left on device : '/x'"), 3 },
        { new UnauthorizedAccessException("Access to the path '/x' is denied."), 3 },
        { new OperationCanceledException(), 4 },
        { new TaskCanceledException(), 4 },
        { new AggregateException(new InputException("inside")), 3 },
        { new InvalidOperationException("of\nours"), 1 },
    };

    [Theory, MemberData(nameof(Faults))]
    public void Every_fault_has_its_exit_code_and_speaks_without_a_stack_trace(Exception fault, int code)
    {
        var error = new StringWriter();

        Assert.Equal(code, Tell(fault, error));

        string[] lines = error.ToString().Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.NotEmpty(lines);
        Assert.All(lines, line => Assert.StartsWith("permute: ", line));
        Assert.Equal(fault.Message.Contains('\n') && code == 3 ? 2 : 1, lines.Length);
    }

    [Fact]
    public void A_fault_of_ours_asks_to_be_reported()
    {
        var error = new StringWriter();
        Tell(new InvalidCastException("gone"), error);
        Assert.Contains("report", error.ToString());
        Assert.Contains("InvalidCastException: gone", error.ToString());
    }

    private static int Tell(Exception fault, StringWriter error) =>
        Permute.Cli.Faults.Tell(fault, new Session(TextWriter.Null, error, ["permute"], default));
}
