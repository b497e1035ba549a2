namespace Campaigns.App.Commands;

/// <summary>What the program ends with; scripts rely on these.</summary>
internal static class ExitCode
{
    public const int Done = 0;
    public const int OurFault = 1;
    public const int WrongUsage = 2;
    public const int Refused = 3;
    public const int NoCatalog = 4;

    /// <summary>The record is not whole: the ledger, or a digest in it, does not match the catalog.</summary>
    public const int RecordBroken = 5;

    /// <summary>Stopped by the user, as shells know it: 128 and the number of the interrupt signal.</summary>
    public const int Stopped = 130;
}
