namespace Campaigns.Torture;

/// <summary>Counts tries of one test; what failed is told at once.</summary>
/// <param name="key">The test.</param>
internal sealed class Tally(string key)
{
    private const int MostTold = 20;
    private readonly Lock _gate = new();

    public int Tried { get; private set; }

    public int Passed { get; private set; }

    public bool IsClean => Tried == Passed && (Tried > 0 || NotTriable is not null);

    /// <summary>What could not be tried here, and why; such a test does not count as failed.</summary>
    public string? NotTriable { get; private set; }

    /// <summary>Says that the machine does not let this be tried.</summary>
    public void Skip(string why) => NotTriable = why;

    /// <summary>One try: passes where nothing is wrong.</summary>
    /// <param name="what">What was tried, for the message where it fails.</param>
    /// <param name="findFault">Gives what is wrong; null where all is well. An exception is a fault too.</param>
    public void Try(string what, Func<string?> findFault)
    {
        string? fault;
        try
        {
            fault = findFault();
        }
#pragma warning disable CA1031 // Whatever the program throws is what this test looks for.
        catch (Exception error)
#pragma warning restore CA1031
        {
            fault = error.ToString();
        }

        Count(what, fault);
    }

    /// <summary>Does the whole test; where it cannot go on, that is a try that failed.</summary>
    public void Guard(Action test)
    {
        try
        {
            test();
        }
#pragma warning disable CA1031 // A test that breaks off must not take the others with it.
        catch (Exception error)
#pragma warning restore CA1031
        {
            Count("the test itself", error.ToString());
        }
    }

    /// <summary>Counts a try whose outcome is known; may be called from several threads.</summary>
    public void Count(string what, string? fault)
    {
        lock (_gate)
        {
            Tried++;
            if (fault is null)
            {
                Passed++;
            }
            else if (Tried - Passed <= MostTold)
            {
                Console.Error.WriteLine($"{key}: {what}: {fault}");
            }
        }
    }
}
