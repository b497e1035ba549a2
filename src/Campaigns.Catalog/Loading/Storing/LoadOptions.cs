namespace Campaigns.Catalog.Loading;

/// <summary>How a measurement file is taken in.</summary>
/// <param name="Reading">How its text is read.</param>
/// <param name="AmendmentReason">Why values may be added to experiments that were tested already; null where they may not.</param>
public sealed record LoadOptions(DelimitedFileOptions Reading, string? AmendmentReason = null);

/// <summary>What loading a file did.</summary>
/// <param name="FileName">The file's name, without its folder.</param>
/// <param name="Sha256">SHA-256 of its bytes, lower-case hexadecimal.</param>
/// <param name="RowCount">Rows taken, those marked as missing included.</param>
/// <param name="MissingCount">Rows whose value is marked as missing.</param>
/// <param name="ExperimentCount">Experiments that received values.</param>
/// <param name="NewExperimentCount">Experiments that were taken from the data; 0 where there is a plan.</param>
/// <param name="AmendedExperiments">Tested experiments that received more values under the reason given.</param>
/// <param name="IgnoredColumns">Columns of the file that are not used.</param>
/// <param name="RespelledNames">Names that were given another spelling of the same letters.</param>
public sealed record LoadSummary(
    string FileName,
    string Sha256,
    long RowCount,
    long MissingCount,
    int ExperimentCount,
    int NewExperimentCount,
    IReadOnlyList<string> AmendedExperiments,
    IReadOnlyList<string> IgnoredColumns,
    IReadOnlyCollection<string> RespelledNames);
