using Campaigns.App.Dashboard;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class DashboardProgramTests
{
    [Fact]
    public void Without_a_terminal_it_refuses_in_one_sentence()
    {
        Assert.SkipUnless(Console.IsInputRedirected || Console.IsOutputRedirected, "These tests were started from a terminal.");
        TextWriter before = Console.Error;
        using StringWriter error = new();
        Console.SetError(error);
        try
        {
            Assert.Equal(2, DashboardProgram.Run(SampleCampaign.Source(SampleCampaign.Standing(3)), SampleCampaign.Code, "Experiments", ascii: false));
        }
        finally
        {
            Console.SetError(before);
        }

        string sentence = error.ToString().Trim();
        Assert.StartsWith("The dashboard needs a terminal", sentence, StringComparison.Ordinal);
        Assert.DoesNotContain('\n', sentence);
    }
}
