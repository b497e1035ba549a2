using System.Globalization;

namespace Campaigns.Torture.Outgoing;

/// <summary>T19: whatever is deleted, fails, is left out, withdrawn, taken back or amended, in any order: the family counts what the rules say, and every missing test is counted and listed.</summary>
internal sealed class FamilyBookkeeping : TortureTest
{
    private const int Steps = 14;

    public override string Key => "T19";

    public override string What => "family bookkeeping";

    public override int Full => 1000;

    public override int Short => 25;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            int seed = random.Next();
            tally.Try(FormattableString.Invariant($"sequence {i + 1} (seed {seed})"), () => Fault(new Random(seed)));
        }
    }

    private static string? Fault(Random random)
    {
        using var held = new BookkeepingCampaign(random);
        var done = new List<string>();
        for (int step = 0; step < Steps; step++)
        {
            done.Add(held.Step());
            if (held.Fault() is { } fault)
            {
                return $"{fault} (after {string.Join(", ", done)})";
            }
        }

        return held.FaultOfOutputs() is { } shown ? string.Create(CultureInfo.InvariantCulture, $"{shown} (after {string.Join(", ", done)})") : null;
    }
}
