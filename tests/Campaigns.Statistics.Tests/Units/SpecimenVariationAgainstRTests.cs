using System.Globalization;
using System.Text;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.Units;

/// <summary>Random experiments with several readings of a specimen sent to R: the nested analysis of variance, and the test on means.</summary>
public sealed class SpecimenVariationAgainstRTests
{
    private const int Seed = 20261203;

    private const string Nested = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          s <- droplevels(s)
          a <- anova(lm(v ~ g + s, data = s))
          m <- aggregate(v ~ g + s, data = s, FUN = mean)
          b <- anova(lm(v ~ g, data = m))
          cat(sprintf('%d,%d,%.17g,%.17g,%.17g,%.17g,%.17g\n', a['s', 'Df'], a['Residuals', 'Df'], a['s', 'Mean Sq'], a['Residuals', 'Mean Sq'],
            a['g', 'Mean Sq'] / a['s', 'Mean Sq'], b$F[1], b$`Pr(>F)`[1]))
        }
        """;

    private const string Strata = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          s <- droplevels(s)
          a <- summary(aov(v ~ g + Error(s), data = s))
          cat(sprintf('%.17g,%.17g\n', a$`Error: s`[[1]]$`F value`[1], a$`Error: s`[[1]]$`Pr(>F)`[1]))
        }
        """;

    [Fact]
    public void Mean_squares_and_the_F_on_means_are_those_of_R()
    {
        RProgram.SkipIfAbsent();
        DesignedSample[] experiments = [.. Draw(new Random(Seed), 200, balanced: false)];
        string[] answers = RProgram.Run(Nested, Input(experiments)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(experiments.Length, answers.Length);
        for (int i = 0; i < experiments.Length; i++)
        {
            double[] r = [.. answers[i].Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            Tested tested = Assert.IsType<Tested>(ExperimentalUnits.Test(new FTest(), experiments[i].Sample, RandomDraws.Usual));
            SpecimenVariation variation = tested.Specimens!;
            Assert.Equal((r[0], r[1]), (variation.BetweenSpecimens.DegreesOfFreedom, variation.WithinSpecimens.DegreesOfFreedom));

            // Values of about 10 with a spread of about 1, up to 100 of them: R loses some hundred units in the last place, more where F is small.
            Relative.AssertNear(r[2], variation.BetweenSpecimens.MeanSquare, 1e-11, "between specimens");
            Relative.AssertNear(r[3], variation.WithinSpecimens.MeanSquare, 1e-11, "within specimens");
            Assert.InRange(Math.Abs(r[5] - tested.Statistic), 0, 1e-11 * (1 + tested.Statistic));
            Assert.InRange(Math.Abs(r[6] - tested.P.Value), 0, 1e-11);
        }
    }

    [Fact]
    public void With_as_many_readings_everywhere_the_F_on_means_is_that_of_groups_over_specimens()
    {
        RProgram.SkipIfAbsent();
        DesignedSample[] experiments = [.. Draw(new Random(Seed + 1), 100, balanced: true)];
        string[] nested = RProgram.Run(Nested, Input(experiments)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        string[] strata = RProgram.Run(Strata, Input(experiments)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        for (int i = 0; i < experiments.Length; i++)
        {
            Tested tested = Assert.IsType<Tested>(ExperimentalUnits.Test(new FTest(), experiments[i].Sample, RandomDraws.Usual));
            double[] f = [double.Parse(nested[i].Split(',')[4], CultureInfo.InvariantCulture), double.Parse(strata[i].Split(',')[0], CultureInfo.InvariantCulture)];
            Assert.All(f, r => Assert.InRange(Math.Abs(r - tested.Statistic), 0, 1e-11 * (1 + tested.Statistic)));
            Assert.InRange(Math.Abs(double.Parse(strata[i].Split(',')[1], CultureInfo.InvariantCulture) - tested.P.Value), 0, 1e-11);
            SpecimenVariation variation = tested.Specimens!;
            Assert.Equal(variation.FewestReadings, variation.MostReadings);

            // With n readings of every specimen, the variance of the means is that between specimens plus that of readings over n.
            double means = tested.Variation!.Within.MeanSquare;
            Assert.InRange(Math.Abs(variation.RawComponent!.Value + (variation.ReadingComponent / variation.MostReadings) - means), 0, 1e-14 * means * variation.MostReadings * (1 + (variation.ReadingComponent / means)));
        }
    }

    private static IEnumerable<DesignedSample> Draw(Random random, int count, bool balanced)
    {
        for (int e = 0; e < count; e++)
        {
            int groups = random.Next(2, 5);
            int specimens = random.Next(2, 6);
            int readings = random.Next(2, 5);
            double spread = 2 * random.NextDouble();
            var rows = new List<DesignedRow>();
            for (int i = 0; i < groups; i++)
            {
                double mean = 10 + RandomDesigns.Normal(random);
                for (int j = 0; j < (balanced ? specimens : specimens + random.Next(3)); j++)
                {
                    double own = mean + (spread * RandomDesigns.Normal(random));
                    int n = balanced || j == 0 ? readings : random.Next(1, 6);
                    rows.AddRange(Enumerable.Range(0, n).Select(_ => new DesignedRow($"g{i}", "", $"s{i}.{j}", (own + RandomDesigns.Normal(random)).ToString("F3", CultureInfo.InvariantCulture))));
                }
            }

            yield return new DesignedSample(rows);
        }
    }

    private static string Input(DesignedSample[] experiments)
    {
        var input = new StringBuilder("e,g,s,v\n");
        for (int i = 0; i < experiments.Length; i++)
        {
            foreach (DesignedRow row in experiments[i].Rows)
            {
                input.Append(CultureInfo.InvariantCulture, $"{i},{row.Group},{row.Specimen},{row.Value}\n");
            }
        }

        return input.ToString();
    }
}
