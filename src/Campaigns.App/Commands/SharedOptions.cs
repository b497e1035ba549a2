using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Loading;

namespace Campaigns.App.Commands;

/// <summary>Options and arguments that several commands share.</summary>
internal static class SharedOptions
{
    public static Option<string?> Catalog { get; } = new("--catalog")
    {
        Description = "The catalog's file (else CAMPAIGNS_CATALOG, else campaigns.db here).",
        HelpName = "FILE",
        Recursive = true,
    };

    public static Option<RowFormat> Format { get; } = new("--format")
    {
        Description = "How rows are printed: table for people, csv or json for scripts.",
        HelpName = "table|csv|json",
        Recursive = true,
        DefaultValueFactory = _ => RowFormat.Table,
    };

    public static Option<int> Top { get; } = new("--top")
    {
        Description = "Rows that a table shows; 0 shows all. Files get all in any case.",
        HelpName = "N",
        Recursive = true,
        DefaultValueFactory = _ => TextTable.UsualRows,
    };

    public static Option<string?> DecimalMark { get; } = WithValues(
        new Option<string?>("--decimal") { Description = "The decimal mark of the file's numbers.", HelpName = "point|comma" }, "point", "comma");

    public static Option<string?> Separator { get; } = WithValues(
        new Option<string?>("--separator") { Description = "What parts the file's columns (else found from its first line).", HelpName = "comma|semicolon|tab" }, "comma", "semicolon", "tab");

    public static Option<string?> Columns { get; } = new("--columns")
    {
        Description = "Other names of the file's columns, for example value=Reading,group=Code.",
        HelpName = "NAME=HEADER,...",
    };

    public static Argument<string> Code() => new("CODE") { Description = "The campaign." };

    /// <summary>How a file of measurements is read.</summary>
    public static DelimitedFileOptions Reading(Session session, IReadOnlyList<string> ourNames)
    {
        string? columns = session.Typed.GetValue(Columns);
        return new DelimitedFileOptions
        {
            DecimalMark = session.Typed.GetValue(DecimalMark) == "comma" ? Campaigns.Catalog.Loading.DecimalMark.Comma : Campaigns.Catalog.Loading.DecimalMark.Point,
            Separator = session.Typed.GetValue(Separator) switch { "comma" => ',', "semicolon" => ';', "tab" => '\t', _ => null },
            Columns = columns is null ? ColumnMap.Empty : ParseColumns(columns, ourNames),
        };
    }

    /// <summary>An option that takes one of a few words.</summary>
    public static Option<string?> WithValues(Option<string?> option, params string[] words)
    {
        option.AcceptOnlyFromAmong(words);
        return option;
    }

    private static ColumnMap ParseColumns(string columns, IReadOnlyList<string> ourNames)
    {
        try
        {
            return ColumnMap.Parse(columns, ourNames);
        }
        catch (Exception error) when (error is FormatException or ArgumentException)
        {
            throw new UsageException($"--columns: {error.Message}");
        }
    }
}
