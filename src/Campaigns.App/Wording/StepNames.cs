namespace Campaigns.App.Wording;

/// <summary>How what can be done next is named: sentences that the shell and the dashboard share name a step through this, and each of the two gets what has to be typed there.</summary>
/// <remarks>Every name can begin a sentence or follow "and", and takes a verb in the singular.</remarks>
internal abstract class StepNames
{
    /// <summary>Steps as commands.</summary>
    public static StepNames Commands { get; } = new InShell();

    /// <summary>Steps as keys of the dashboard.</summary>
    /// <param name="open">Code of the open campaign, the one that keys act on.</param>
    public static StepNames Keys(string open) => new InDashboard(open);

    /// <summary>What runs the tests of a campaign.</summary>
    /// <param name="campaign">Its code.</param>
    public abstract string Test(string campaign);

    /// <summary>What leaves incomplete experiments alone when a campaign is tested, and how they are tested all the same.</summary>
    public abstract (string Step, string Unless) TestIncomplete { get; }

    /// <summary>What takes a review of a campaign.</summary>
    /// <param name="campaign">Its code.</param>
    public abstract string Review(string campaign);

    /// <summary>What tells how a sealed plan was amended.</summary>
    /// <param name="campaign">The campaign's code.</param>
    public abstract string PlanChanges(string campaign);

    /// <summary>What tells why an experiment deviates from its plan.</summary>
    /// <param name="campaign">The campaign's code.</param>
    public abstract string Deviation(string campaign);

    private sealed class InShell : StepNames
    {
        public override (string Step, string Unless) TestIncomplete => ("'campaigns test'", "without --incomplete");

        public override string Test(string campaign) => $"'campaigns test {campaign}'";

        public override string Review(string campaign) => $"'campaigns review {campaign}'";

        public override string PlanChanges(string campaign) => $"'campaigns show {campaign}'";

        public override string Deviation(string campaign) => $"'campaigns show {campaign} EXPERIMENT'";
    }

    private sealed class InDashboard(string open) : StepNames
    {
        public override (string Step, string Unless) TestIncomplete => ("key t", "unless its form says otherwise");

        public override string Test(string campaign) => "key t" + Opening(campaign);

        public override string Review(string campaign) => "key v" + Opening(campaign);

        public override string PlanChanges(string campaign) => "the page Ledger" + Opening(campaign);

        public override string Deviation(string campaign) => "the page Experiments" + Opening(campaign);

        private string Opening(string campaign) => campaign == open ? "" : " (Enter first, which opens the campaign)";
    }
}
