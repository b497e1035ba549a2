using System.Globalization;

namespace Campaigns.App.Tests.Commands;

/// <summary>An invented campaign of three families, one behind a gate that any survivor of the first opens, and one behind a gate that waits for all of the second; the second weighs.</summary>
internal static class ThreeFamilies
{
    public const string Families = "family,correction,level,opens_after,opens_when\nprimary,,0.03,,\nsecondary,weighted-holm,,primary,any\nextra,hommel,,secondary,all\n";

    public const string Plan = """
        experiment,title,groups,follow_up,weight,family,shared_control
        P1,Binder,a|b|c,holm-pairs,,primary,
        P2,Filler,a|b|c,holm-pairs,,primary,
        P3,Not done,a|b|c,holm-pairs,,primary,
        S1,Gloss,a|b|c,holm-pairs,3,secondary,
        S2,Flow,a|b|c,holm-pairs,1,secondary,
        X1,Smell,a|b|c,holm-pairs,,extra,
        X2,Colour,a|b|c,holm-pairs,,extra,

        """;

    /// <summary>Six values a group; the third group lies apart from the others, in S2 by as much as is given.</summary>
    public static string Folder(Workplace place, double shiftOfLast)
    {
        double[] pattern = [1.0, 1.2, 0.8, 1.1, 0.9, 1.05];
        (string Code, double Shift)[] shifts = [("P1", 1), ("P2", 0.05), ("S1", 0.6), ("S2", shiftOfLast), ("X1", 0.5), ("X2", 0.1)];
        IEnumerable<string> rows = shifts.SelectMany(e => "abc".SelectMany(g => pattern.Select((v, i) =>
            string.Create(CultureInfo.InvariantCulture, $"{e.Code},{g},{v + (g == 'c' ? e.Shift : 0) + (0.01 * ((i * 5 + g) % 7)):0.00}"))));
        place.Write("F/campaign.json", """{"code": "F", "title": "Three families", "errorRate": "familywise", "level": 0.05, "correction": "holm"}""");
        place.Write("F/plan.csv", Plan);
        place.Write("F/families.csv", Families);
        place.Write("F/measurements/week-01.csv", "experiment,group,value\n" + string.Join('\n', rows) + "\n");
        return place.At("F");
    }
}
