namespace Campaigns.Torture;

/// <summary>One way of hurting the program, tried many times. A new one is a file, and a line in <see cref="TortureRegistry"/>.</summary>
internal abstract class TortureTest
{
    /// <summary>Its number, for example "T7".</summary>
    public abstract string Key { get; }

    /// <summary>What is done to the program, in a few words.</summary>
    public abstract string What { get; }

    /// <summary>Tries of a full run.</summary>
    public abstract int Full { get; }

    /// <summary>Tries of the short run; 0 where the test is left to the full one.</summary>
    public abstract int Short { get; }

    /// <summary>Does it.</summary>
    /// <param name="tally">Counts what was tried, and what passed.</param>
    /// <param name="tries">How often; a test whose tries are made of the data may count more.</param>
    /// <param name="random">Random numbers from the seed that is printed.</param>
    public abstract void Run(Tally tally, int tries, Random random);
}
