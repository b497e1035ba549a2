using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Microsoft.Data.Sqlite;
using Microsoft.Extensions.Time.Testing;

namespace Campaigns.Torture.Catalogs;

/// <summary>T9: the computer's clock goes back and jumps ahead, past 2038 and over changes of summer time and zone; the sequence rises, the chain holds, and every step back is recorded as one.</summary>
internal sealed class ClockWalks : TortureTest
{
    private const int Steps = 12;

    private static readonly TimeSpan[] Jumps =
    [
        TimeSpan.FromSeconds(-1), TimeSpan.FromHours(-1), TimeSpan.FromDays(-3652), TimeSpan.FromTicks(-10), TimeSpan.FromTicks(-1), TimeSpan.Zero,
        TimeSpan.FromTicks(10), TimeSpan.FromSeconds(1), TimeSpan.FromHours(1), TimeSpan.FromDays(365), TimeSpan.FromDays(4400), TimeSpan.FromDays(30_000),
    ];

    private static readonly DateTimeOffset[] Places =
    [
        new(2038, 1, 19, 3, 14, 7, TimeSpan.Zero), new(2026, 3, 29, 1, 0, 0, TimeSpan.Zero), new(2026, 10, 25, 1, 0, 0, TimeSpan.Zero),
        new(1970, 1, 1, 0, 0, 0, TimeSpan.Zero), new(1969, 12, 31, 23, 59, 59, TimeSpan.Zero), new(9999, 12, 31, 23, 59, 59, TimeSpan.Zero),
    ];

    public override string Key => "T9";

    public override string What => "clocks that jump";

    public override int Full => 1_000;

    public override int Short => 100;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            tally.Try(RecordedLife.Text($"walk {i}"), () => Fault(random));
        }
    }

    private static string? Fault(Random random)
    {
        var clock = new FakeTimeProvider(new DateTimeOffset(2026, 12, 1, 8, 0, 0, TimeSpan.Zero));
        using SqliteConnection memory = SqliteCatalogFile.InMemory();
        using Campaigns.Catalog.Catalog catalog = Campaigns.Catalog.Catalog.On(memory, "memory", clock, new Actor("nobody"));
        var given = new List<DateTimeOffset>();
        for (int i = 0; i < Steps; i++)
        {
            Move(clock, random);
            given.Add(clock.GetUtcNow());
            if (i == 0)
            {
                new CampaignStore(catalog).Open(new Campaign
                {
                    Code = "C",
                    ErrorRate = ErrorRate.FalseDiscovery,
                    Level = new SignificanceLevel(0.05),
                    Correction = "bh",
                    OpenedAt = clock.GetUtcNow(),
                });
            }
            else
            {
                new PlanStore(catalog).Register("C", [new PlannedExperiment { Code = RecordedLife.Text($"E{i}"), Groups = ["a", "b"], Test = "f", FollowUp = "none" }]);
            }
        }

        LedgerProof proof = new LedgerVerifier(catalog).Verify();
        LedgerEntry[] entries = [.. new LedgerReader(catalog).Entries(new LedgerFilter())];
        if (!proof.IsWhole)
        {
            return proof.Findings[0].ToString();
        }

        if (!entries.Select(e => e.Sequence).SequenceEqual(Enumerable.Range(1, Steps).Select(i => (long)i)))
        {
            return "the sequence does not rise by one, in the order in which it is listed";
        }

        for (int i = 0; i < Steps; i++)
        {
            // The catalog keeps whole microseconds.
            if (Math.Abs(entries[i].At.UtcTicks - given[i].UtcTicks) >= TimeSpan.TicksPerMicrosecond)
            {
                return RecordedLife.Text($"entry {i + 1} says {entries[i].At:O}, the clock said {given[i]:O}");
            }

            bool isBack = i > 0 && entries[i].At < entries[i - 1].At;
            if (isBack != entries[i].Changes.Any(c => c.What == LedgerChange.Clock))
            {
                return RecordedLife.Text($"entry {i + 1}: the clock went back is {isBack}, and its changes say otherwise");
            }
        }

        long back = entries.Zip(entries.Skip(1)).Count(pair => pair.Second.At < pair.First.At);
        return proof.ClockSteps == back ? null : RecordedLife.Text($"{back} steps back, {proof.ClockSteps} told");
    }

    private static void Move(FakeTimeProvider clock, Random random)
    {
        DateTimeOffset now = clock.GetUtcNow();
        TimeSpan jump = Jumps[random.Next(Jumps.Length)];
        bool fits = jump < TimeSpan.Zero ? now - DateTimeOffset.MinValue > -jump : DateTimeOffset.MaxValue - now > jump;
        clock.AdjustTime(random.Next(5) == 0 || !fits ? Places[random.Next(Places.Length)] : now + jump);
        clock.SetLocalTimeZone(TimeZoneInfo.CreateCustomTimeZone("zone", TimeSpan.FromHours(random.Next(-12, 15)), "zone", "zone"));
    }
}
