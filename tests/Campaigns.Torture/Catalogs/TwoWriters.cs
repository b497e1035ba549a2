using System.Diagnostics;

namespace Campaigns.Torture.Catalogs;

/// <summary>T5: two processes write into one catalog at once, without a pause; neither hears of a lock, and the ledger is one chain.</summary>
internal sealed class TwoWriters : TortureTest
{
    private const int ActionsOfARun = 500;
    private const int ActionsOfAShortRun = 60;

    public override string Key => "T5";

    public override string What => "two writers at once";

    public override int Full => 10;

    public override int Short => 1;

    public override void Run(Tally tally, int tries, Random random)
    {
        int actions = tries < Full ? ActionsOfAShortRun : ActionsOfARun;
        for (int i = 0; i < tries; i++)
        {
            tally.Try(FormattableString.Invariant($"run {i}"), () => Fault(actions));
        }
    }

    private static string? Fault(int actions)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        string[] names = ["A", "B"];
        Process[] writers = [.. names.Select(name => Worker.StartCampaigns(bench.Catalog, name, actions))];
        Task<string>[] output = [.. writers.Select(w => w.StandardOutput.ReadToEndAsync())], errors = [.. writers.Select(w => w.StandardError.ReadToEndAsync())];
        foreach (Process writer in writers)
        {
            if (!writer.WaitForExit(TimeSpan.FromMinutes(5)))
            {
                writer.Kill();
            }

            writer.WaitForExit();
        }

        string said = string.Concat(errors.Select(e => e.GetAwaiter().GetResult()));
        int[] codes = [.. writers.Select(w => w.ExitCode)];
        string[] kept = [.. output.SelectMany(o => o.GetAwaiter().GetResult().Split('\n')).Select(Worker.Kept).OfType<string>()];
        Array.ForEach(writers, w => w.Dispose());
        return said.Length > 0 || codes.Any(c => c != 0) ? $"exit codes {string.Join(", ", codes)}: {said}"
            : kept.Length != actions * names.Length ? FormattableString.Invariant($"{kept.Length} acknowledged of {actions * names.Length}")
            : Inspection.Fault(bench.Catalog) ?? Inspection.Missing(bench.Catalog, "SELECT code FROM campaigns", kept);
    }
}
