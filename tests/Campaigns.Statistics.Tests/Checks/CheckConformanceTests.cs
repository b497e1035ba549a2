using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Checks;

public sealed class CheckConformanceTests
{
    [Fact]
    public void Every_check_of_the_assembly_is_in_the_registry_once()
    {
        IEnumerable<Type> written = typeof(ExperimentCheck).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(ExperimentCheck)) && !t.IsAbstract);
        Assert.Equal(written.OrderBy(t => t.FullName, StringComparer.Ordinal), CheckRegistry.All.Select(t => t.GetType()).OrderBy(t => t.FullName, StringComparer.Ordinal));
        Assert.NotEmpty(CheckRegistry.All);
    }

    [Fact]
    public void Keys_are_unique_lower_case_and_frozen()
    {
        string[] frozen = [.. File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Select(l => l.Split(' '))
            .Where(l => l[0] == "check")
            .Select(l => l[1])];
        string[] keys = [.. CheckRegistry.All.Select(t => t.Key)];
        Assert.Equal(keys.Length, keys.Distinct().Count());
        Assert.All(keys, k => Assert.Matches("^[a-z][a-z-]*$", k));
        Assert.Equal(frozen.Order(StringComparer.Ordinal), keys.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Every_check_says_what_it_does_in_whole_sentences()
    {
        Assert.All(CheckRegistry.All, c =>
        {
            Assert.False(string.IsNullOrWhiteSpace(c.Name));
            Assert.All([c.CannotSee, c.Advice, c.Source], text => Assert.Matches(@"^[A-Z].*\.$", text));
            Assert.Same(c, CheckRegistry.Find(c.Key));
        });
        Assert.Null(CheckRegistry.Find("no such check"));
    }

    [Fact]
    public void Every_check_answers_samples_that_hold_nothing_with_a_reason() =>
        Assert.All([CheckedExperiment.Of(), CheckedExperiment.Of("", ""), CheckedExperiment.Of("1", ""), CheckedExperiment.Of("1 2 3", "")], e =>
            Assert.All(e.Report(), line => Assert.Equal(CheckVerdict.NotPossible, line.Finding.Verdict)));

    [Fact]
    public void The_report_has_a_line_a_check_in_the_order_of_the_registry()
    {
        CheckedExperiment experiment = CheckedExperiment.Of("1 2 4", "2 4 7", "9 3 5");
        IReadOnlyList<CheckLine> lines = experiment.Report();
        Assert.Equal(CheckRegistry.All.Select(c => (c.Key, c.Name)), lines.Select(l => (l.Key, l.Name)));
        Assert.Equal(CheckRegistry.All.Select(experiment.Look), lines.Select(l => l.Finding));
    }
}
