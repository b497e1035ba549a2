using Campaigns.App.Tests.Dashboard;

namespace Campaigns.App.Tests.Commands;

/// <summary>What a window of 80 columns shows of a plan and its changes: reasons, titles and groups are said in full.</summary>
public sealed class PlanChangeWidthTests : IDisposable
{
    private const string Reason = "the resin that was planned is no longer made by its supplier, and the laboratory has none left to coat the panels with";

    private const string Title = "Gloss of the second coat over the primer that was sanded by hand, on steel";

    private readonly Workplace _place = new() { Width = 80 };

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Reasons_and_values_are_wrapped_and_never_cut()
    {
        _place.Run("run", _place.Campaign("C", $"experiment,title,groups\nE1,\"{Title}\",a|b\nE2,two,a|b\nE3,three,a|b\n", Workplace.TwoExperiments)).Well();
        _place.Run("withdraw", "C", "E3", "--reason", Reason).Well();
        _place.Run("plan", "C", _place.Write("again.csv", $"experiment,title,groups\nE1,one,a|b\nE2,\"{Title}\",a|b\n"), "--reason", Reason).Well();
        foreach ((string part, string[] said) in (IEnumerable<(string, string[])>)[("--plan", [Title]), ("--sealed-plan", [Title]), ("--amendments", [Reason, Title]), ("--withdrawals", [Reason])])
        {
            string shown = _place.Run("show", "C", part).Well().Out;
            Assert.DoesNotContain('…', shown);
            Assert.All(shown.Split('\n'), line => Assert.InRange(line.Length, 0, 80));
            Assert.All(said.SelectMany(s => s.Split(' ')), word => Assert.Contains(word, shown, StringComparison.Ordinal));
        }

        Golden.Match("plan-changes", string.Concat(((string[])["--plan", "--amendments", "--withdrawals"]).Select(part => $"$ show C {part}\n{_place.Run("show", "C", part).Well().Out}\n")));
    }
}
