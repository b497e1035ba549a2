using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>The experiments whose statistics were computed by exact rational arithmetic, with those statistics.</summary>
internal static class ReferenceExperiments
{
    /// <summary>200 random experiments, values read as doubles as the reference read them.</summary>
    public static IEnumerable<(ReferenceRow Truth, TypedSample Sample)> Random() =>
        Read("experiments", TypedSample.OfDoubles);

    /// <summary>15 published examples, values as typed.</summary>
    public static IEnumerable<(ReferenceRow Truth, TypedSample Sample)> Worked() =>
        Read("worked_examples", TypedSample.OfText);

    public static Tested Worked(string name, GroupTest test) =>
        Assert.IsType<Tested>(Worked().Single(e => e.Truth.Text("experiment") == name).Sample.Test(test));

    private static IEnumerable<(ReferenceRow Truth, TypedSample Sample)> Read(string name, Func<IEnumerable<(string, string)>, TypedSample> read)
    {
        ILookup<string, (string, string)> data = ReferenceTable.Read($"experiment/{name}_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value")));
        return ReferenceTable.Read($"experiment/{name}_exact.csv").Rows.Select(truth => (truth, read(data[truth.Text("experiment")])));
    }
}
