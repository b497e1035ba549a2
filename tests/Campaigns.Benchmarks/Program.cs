using System.Globalization;
using BenchmarkDotNet.Running;
using Campaigns.Benchmarks;
using Campaigns.Benchmarks.Generating;
using Campaigns.Benchmarks.Kernels;
using Campaigns.Benchmarks.Simulating;

const string Usage = """
    generate SIZE FOLDER [--shuffled] [--plan]   write a synthetic campaign folder; SIZE is S, M, L or EXPERIMENTSxGROUPSxREPLICATES
    arrive CATALOG CODE N                        milliseconds of N arrivals of one more experiment, inside one process
    read CATALOG CODE N                          milliseconds of opening a catalog and of reading a campaign, inside one process
    time                                         milliseconds of a few large kernels
    errors [REPLICATES]                          how often each omnibus test rejects where all means are equal (20000 experiments a design); Markdown
    campaign-errors [REPLICATES]                 the error rates that every procedure over a campaign really has (20000 campaigns a scenario); Markdown
    kernels [BENCHMARKDOTNET OPTION ...]         careful benchmarks of the hot kernels; --filter '*' runs them all
    """;

switch (args)
{
    case ["generate", string sizeText, string folder, .. string[] options]
        when CampaignSize.Parse(sizeText) is { } size && options.All(o => o is "--shuffled" or "--plan"):
        CampaignFolder.Write(new SyntheticCampaign(size), folder, options.Contains("--shuffled"), options.Contains("--plan"));
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{folder}: {size.Rows} rows"));
        return 0;
    case ["arrive", string catalog, string code, string arrivals]
        when int.TryParse(arrivals, NumberStyles.None, CultureInfo.InvariantCulture, out int count):
        Arrival.Print(catalog, code, count, Console.Out);
        return 0;
    case ["read", string catalog, string code, string timesText]
        when int.TryParse(timesText, NumberStyles.None, CultureInfo.InvariantCulture, out int times) && times > 0:
        Reading.Print(catalog, code, times, Console.Out);
        return 0;
    case ["time"]:
        Timings.Print(Console.Out);
        return 0;
    case ["errors"]:
        ErrorRates.Print(ErrorRates.UsualReplicates, Console.Out);
        return 0;
    case ["errors", string replicatesText]
        when int.TryParse(replicatesText, NumberStyles.None, CultureInfo.InvariantCulture, out int replicates) && replicates > 0:
        ErrorRates.Print(replicates, Console.Out);
        return 0;
    case ["campaign-errors"]:
        CampaignErrors.Print(CampaignErrors.UsualReplicates, Console.Out);
        return 0;
    case ["campaign-errors", string campaignsText]
        when int.TryParse(campaignsText, NumberStyles.None, CultureInfo.InvariantCulture, out int campaigns) && campaigns > 0:
        CampaignErrors.Print(campaigns, Console.Out);
        return 0;
    case ["kernels", .. string[] options]:
        BenchmarkSwitcher.FromAssembly(typeof(CorrectionKernels).Assembly).Run(options);
        return 0;
    default:
        Console.Error.WriteLine(Usage);
        return 2;
}
