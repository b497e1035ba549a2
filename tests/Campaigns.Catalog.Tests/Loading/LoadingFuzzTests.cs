using System.Diagnostics;
using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

/// <summary>Good files, damaged at random with a fixed seed: every reader answers with rows and problems, soon, and with no other exception.</summary>
public sealed class LoadingFuzzTests
{
    private const int Mutations = 2_000;

    private static readonly TimeSpan Longest = TimeSpan.FromSeconds(10);

    private static readonly KnownKeys Known = new(["f", "welch"], ["none", "dunnett"], ["holm", "bh"]);

    private static readonly byte[] Tricky = [0, (byte)'"', (byte)'\n', (byte)'\r', (byte)',', (byte)';', (byte)'\t', (byte)' ', (byte)'-', (byte)'.', (byte)'e', (byte)'9', (byte)'{', (byte)'\\', 0x1B, 0x80, 0xC3, 0xE2, 0xF0, 0xFE, 0xFF, 0xEF];

    [Fact]
    public void Damaged_files_of_measurements_are_answered()
    {
        Damage(GoodMeasurements(), 20250104, path =>
        {
            using MeasurementFile file = MeasurementFile.Open(path, DelimitedFileOptions.Default);
            long last = 0;
            while (file.Read(out MeasurementRow row))
            {
                Assert.True(row.Line > last, "Lines rise.");
                Assert.False(row.Experiment.IsEmpty || row.Group.IsEmpty);
                Assert.True(row.IsMissing || double.IsFinite(row.Value.ToDouble()));
                last = row.Line;
            }

            Assert.True(file.RowCount > 0 || !file.Problems.IsEmpty, "A file without rows is refused.");
            Assert.False(file.Read(out _));
            AssertSound(file.Problems);
        });
    }

    [Fact]
    public void Damaged_plans_and_tables_are_answered()
    {
        string plan = "experiment,title,response,unit,groups,control,test,follow_up,replicates,smallest_effect,assumed_sd,weight,family\n"
            + "E1,\"A, title\",adhesion,MPa,ctrl|A|B,ctrl,f,dunnett,6,0.5,0.25,1,\nE2,Größe,gloss,%,A|B,,welch,none,4,1e-3,,0,x\n";
        Damage([Encoding.UTF8.GetBytes(plan), [0xFF, 0xFE, .. Encoding.Unicode.GetBytes(plan)]], 20250105, path =>
        {
            PlanFileResult result = PlanFile.Read(path, DelimitedFileOptions.Default, new PlanDefaults("f", "none"), Known);
            Assert.True(result.Experiments.Count > 0 || !result.Problems.IsEmpty);
            AssertSound(result.Problems);
            DelimitedTable table = DelimitedTable.Read(path, DelimitedFileOptions.Default);
            AssertSound(table.Problems);
            for (int row = 0; row < table.RowCount; row++)
            {
                for (int column = 0; column < table.Headers.Count; column++)
                {
                    PValueText.TryParse(table.CellUtf8(row, column), DecimalMark.Point, out _, out _);
                }
            }
        });
    }

    [Fact]
    public void Damaged_campaign_files_are_answered()
    {
        byte[] json = "{\n \"code\": \"Primer-1\", \"title\": \"Größe \\u00e4\",\n \"errorRate\": \"familywise\", \"level\": 0.05, \"correction\": \"holm\", \"test\": \"f\", \"followUp\": \"none\" }"u8.ToArray();
        Damage([json], 20250106, path =>
        {
            CampaignFileResult result = CampaignFile.Read(path, Known);
            Assert.Equal(result.Campaign is null, !result.Problems.IsEmpty);
            AssertSound(result.Problems);
        });
    }

    private static void AssertSound(ImportProblems problems)
    {
        foreach (string sentence in problems.Sentences())
        {
            Assert.DoesNotContain(sentence, char.IsControl);
            Assert.InRange(sentence.Length, 10, 1500);
        }
    }

    private static List<byte[]> GoodMeasurements()
    {
        List<byte[]> files = [];
        foreach (string end in (string[])["\n", "\r\n", "\r"])
        {
            foreach (char separator in ",;\t")
            {
                StringBuilder text = new(string.Join(separator, "experiment", "group", "value", "specimen", "order", "note") + end);
                for (int i = 1; i <= 20; i++)
                {
                    text.Append(string.Join(separator, "E1", i % 2 == 0 ? "Größe" : "\"A \"\"1\"\"\"", FormattableString.Invariant($"{i}.5e{i - 10}"), "P" + i % 5, i, "\"two" + end + "lines\"")).Append(end);
                }

                files.Add(Encoding.UTF8.GetBytes(text.ToString()));
                files.Add([0xFF, 0xFE, .. Encoding.Unicode.GetBytes(text.ToString())]);
            }
        }

        return files;
    }

    private static void Damage(List<byte[]> good, int seed, Action<string> read)
    {
        Random random = new(seed);
        using TestFile file = new("");
        for (int i = 0; i < Mutations; i++)
        {
            List<byte> bytes = [.. good[i % good.Count]];
            for (int changes = random.Next(1, 5); changes > 0 && bytes.Count > 1; changes--)
            {
                Change(bytes, random);
            }

            File.WriteAllBytes(file.Path, [.. bytes]);
            Stopwatch watch = Stopwatch.StartNew();
            try
            {
                read(file.Path);
            }
            catch (Exception e) when (e is not Xunit.Sdk.XunitException)
            {
                Assert.Fail($"Mutation {i}: {e}");
            }

            Assert.True(watch.Elapsed < Longest, $"Mutation {i} took {watch.Elapsed}.");
        }
    }

    private static void Change(List<byte> bytes, Random random)
    {
        int at = random.Next(bytes.Count);
        int length = Math.Min(random.Next(1, 60), bytes.Count - at);
        switch (random.Next(6))
        {
            case 0:
                bytes[at] ^= (byte)(1 << random.Next(8));
                break;
            case 1:
                bytes[at] = Tricky[random.Next(Tricky.Length)];
                break;
            case 2:
                bytes.Insert(at, Tricky[random.Next(Tricky.Length)]);
                break;
            case 3:
                bytes.RemoveRange(at, length);
                break;
            case 4:
                bytes.InsertRange(random.Next(bytes.Count), bytes.GetRange(at, length));
                break;
            default:
                bytes.RemoveRange(at, bytes.Count - at);
                break;
        }
    }
}
