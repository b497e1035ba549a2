using Campaigns.Catalog.Ledger;

namespace Campaigns.Torture.Catalogs;

/// <summary>T6: two people saw the same head and both change the same experiment; one does, the other is told what was done meanwhile, and may then still do it.</summary>
internal sealed class TwoEditors : TortureTest
{
    private const int Lines = 48;

    public override string Key => "T6";

    public override string What => "two editors of the same experiment";

    public override int Full => 100;

    public override int Short => 20;

    public override void Run(Tally tally, int tries, Random random)
    {
        using var bench = new Workbench();
        RecordedLife.Live(bench, 12);
        for (int i = 0; i < tries; i++)
        {
            // Two values of one experiment, chosen so that neither decision is refused for standing already.
            int line = (i % (Lines / 2) * 2) + 2;
            bool isRace = random.Next(2) == 0;
            bool takesBack = i / (Lines / 2) % 2 == 1;
            tally.Try(RecordedLife.Text($"{(isRace ? "at once" : "one after the other")}, lines {line} and {line + 1}"), () => Fault(bench, line, takesBack, isRace));
        }
    }

    private static string? Fault(Workbench bench, int line, bool takesBack, bool isRace)
    {
        LedgerHead seen = RecordedLife.Head(bench);
        Ran first, second;
        if (isRace)
        {
            Task<Ran> one = Task.Run(() => Decide(bench, line, takesBack, "Ada", seen)), other = Task.Run(() => Decide(bench, line + 1, takesBack, "Ben", seen));
            (first, second) = (one.GetAwaiter().GetResult(), other.GetAwaiter().GetResult());
        }
        else
        {
            first = Decide(bench, line, takesBack, "Ada", seen);
            second = Decide(bench, line + 1, takesBack, "Ben", seen);
        }

        bool firstWon = first.Code == 0;
        (Ran won, Ran lost) = firstWon ? (first, second) : (second, first);
        string winner = firstWon ? "Ada" : "Ben", loser = firstWon ? "Ben" : "Ada";
        LedgerHead head = RecordedLife.Head(bench);
        if (won.Code != 0 || lost.Code != 3 || (!isRace && !firstWon))
        {
            return RecordedLife.Text($"exit codes {first.Code} and {second.Code}: {first.Error}{second.Error}");
        }

        if (head.Sequence != seen.Sequence + 1 || !lost.Error.Contains(RecordedLife.Text($"\n  {head.Sequence}. "), StringComparison.Ordinal) || !lost.Error.Contains(winner, StringComparison.Ordinal))
        {
            return RecordedLife.Text($"the refusal does not name entry {head.Sequence} of {winner}: {lost.Error}");
        }

        Ran again = Decide(bench, firstWon ? line + 1 : line, takesBack, loser, head);
        return again.Code != 0 ? $"with the new head: {again.Error}"
            : RecordedLife.Head(bench).Sequence != seen.Sequence + 2 ? "an entry is missing"
            : bench.Run("ledger", "verify", "--head", head.ToString()) is { Code: not 0 } proof ? proof.Error
            : null;
    }

    private static Ran Decide(Workbench bench, int line, bool takesBack, string name, LedgerHead seen)
    {
        string experiment = RecordedLife.Text($"E{((line - 2) / 8) + 1}");
        return bench.Run([
            "exclude", "A", experiment, "--line", RecordedLife.Text($"{line}"), "--reason", "looked at", "--as", name, "--head", seen.ToString(), .. takesBack ? ["--take-back"] : Array.Empty<string>(),
        ]);
    }
}
