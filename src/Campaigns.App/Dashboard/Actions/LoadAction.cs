using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Takes a measurement file into the campaign.</summary>
internal sealed class LoadAction : DashboardAction
{
    private const string File = "file";
    private const string Decimal = "decimal mark";
    private const string Separator = "separator";
    private const string Columns = "columns";
    private const string Amend = "amend because";
    private const string FromFirstLine = "as its first line shows";

    /// <inheritdoc/>
    public override char Key => 'l';

    /// <inheritdoc/>
    public override string Name => "load a file";

    /// <inheritdoc/>
    public override string Does => "Takes a file of measurements into the campaign, whole or not at all; the same file is never taken twice.";

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk) =>
    [
        new(File, "The file, with the columns experiment, group, value, and where recorded specimen, block, order. Tab completes.", "")
        {
            IfEmpty = "Which file? Type its path; Tab completes it.",
            Suggest = values => FileNames.That(values[File]),
        },
        new(Decimal, "The decimal mark of the file's numbers.", "point") { Words = ["point", "comma"] },
        new(Separator, "What parts the file's columns.", FromFirstLine) { Words = [FromFirstLine, "comma", "semicolon", "tab"] },
        new(Columns, "Other names of the file's columns, for example value=Reading,group=Code; may stay empty.", ""),
        new(Amend, "Only where values are added to experiments that were tested already: why; recorded and shown.", ""),
    ];

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        LoadSummary load = Load(work);
        bool isPlanned = !new CampaignStore(work.Catalog).Get(work.Campaign).Campaign.IsExploratory;
        LoadOutlook outlook = new LoadOutlookReader(work.Catalog).Read(work.Campaign);
        List<string> sentences = [$"{load.FileName} will be loaded: {LoadWording.Content(load)}.", .. LoadWording.Outlook(outlook, isPlanned), .. LoadWording.Notices(load)];
        if (load.AmendedExperiments.Count > 0)
        {
            sentences.Add($"An amendment of tested experiments will be recorded, with its reason: {TestWording.Named(load.AmendedExperiments)}. They count as not tested until they are tested again.");
        }

        return new Preview(sentences) { Expected = load.RowCount };
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        LoadSummary load = Load(work);
        List<string> sentences = [LoadWording.Loaded(load), .. LoadWording.Notices(load)];
        if (LoadWording.Amended(work.Campaign, load, work.Steps) is { } amended)
        {
            sentences.Add(amended);
        }

        else
        {
            sentences.Add($"{Sentence.Start(work.Steps.Test(work.Campaign))} tests what is complete.");
        }

        return sentences;
    }

    private static LoadSummary Load(ActionWork work) =>
        new MeasurementLoader(work.Catalog).Load(work.Campaign, FileNames.Whole(work.Values[File]), Options(work.Values), work.Report, work.Cancel);

    private static LoadOptions Options(ActionValues values) => new(
        new DelimitedFileOptions
        {
            DecimalMark = values[Decimal] == "comma" ? DecimalMark.Comma : DecimalMark.Point,
            Separator = values[Separator] switch { "comma" => ',', "semicolon" => ';', "tab" => '\t', _ => null },
            Columns = values.Given(Columns) is { } columns ? SharedOptions.ParseColumns(columns, MeasurementFile.ColumnNames) : ColumnMap.Empty,
        },
        values.Given(Amend));
}
