using System.Globalization;
using Campaigns.Benchmarks.Generating;

const string Usage = """
    generate SIZE FOLDER [--shuffled] [--plan]   write a synthetic campaign folder; SIZE is S, M, L or EXPERIMENTSxGROUPSxREPLICATES
    """;

switch (args)
{
    case ["generate", string sizeText, string folder, .. string[] options]
        when CampaignSize.Parse(sizeText) is { } size && options.All(o => o is "--shuffled" or "--plan"):
        CampaignFolder.Write(new SyntheticCampaign(size), folder, options.Contains("--shuffled"), options.Contains("--plan"));
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{folder}: {size.Rows} rows"));
        return 0;
    default:
        Console.Error.WriteLine(Usage);
        return 2;
}
