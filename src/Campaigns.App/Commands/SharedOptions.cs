using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;

namespace Campaigns.App.Commands;

/// <summary>Options and arguments that several commands share.</summary>
internal static class SharedOptions
{
    private static readonly string[] FormatWords = ["table", "csv", "json"];

    public static Option<string?> Catalog { get; } = TypedOptions.NotBlank(new Option<string?>("--catalog")
    {
        Description = "The catalog's file (else CAMPAIGNS_CATALOG, else campaigns.db here).",
        HelpName = "FILE",
        Recursive = true,
    });

    public static Option<string?> ActingAs { get; } = TypedOptions.NotBlank(new Option<string?>("--as")
    {
        Description = "Who acts; the ledger keeps this name beside the account.",
        HelpName = "NAME",
        Recursive = true,
    });

    /// <summary>For commands that change a campaign.</summary>
    public static Option<LedgerHead?> Seen { get; } = HeadOption(
        "Change the campaign only if nobody changed it since this head of the ledger, as 'campaigns show' prints it; otherwise it is refused, with what was done since.");

    public static Option<RowFormat> Format { get; } = NewFormat();

    public static Option<int> Top { get; } = NewTop();

    public static Option<string?> DecimalMark { get; } = TypedOptions.Word("--decimal", "The decimal mark of the file's numbers (else point).", "point|comma", "point", "comma");

    public static Option<string?> Separator { get; } = TypedOptions.Word(
        "--separator", "What parts the file's columns (else found from its first line).", "comma|semicolon|tab", "comma", "semicolon", "tab");

    public static Option<string?> Columns { get; } = new("--columns")
    {
        Description = "Other names of the file's columns, for example value=Reading,group=Code.",
        HelpName = "NAME=HEADER,...",
    };

    public static Argument<string> Code() => TypedOptions.NotBlank(new Argument<string>("CODE") { Description = "The campaign." });

    /// <summary>An option that takes a head of the ledger.</summary>
    public static Option<LedgerHead?> HeadOption(string description) => new("--head")
    {
        Description = description,
        HelpName = "SEQUENCE:HASH",
        CustomParser = typed =>
        {
            string word = typed.Tokens[0].Value;
            if (LedgerHead.TryParse(word, out LedgerHead head))
            {
                return head;
            }

            typed.AddError($"--head takes a head as it was printed, SEQUENCE:HASH with 64 hexadecimal digits, not '{word}'.");
            return null;
        },
    };

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

    private static Option<RowFormat> NewFormat()
    {
        var option = new Option<RowFormat>("--format")
        {
            Description = "How rows are printed: table for people (the default), csv or json for scripts.",
            HelpName = "table|csv|json",
            Recursive = true,
            CustomParser = typed => TypedOptions.WordOf(typed, "--format", FormatWords) switch { "csv" => RowFormat.Csv, "json" => RowFormat.Json, _ => RowFormat.Table },
        };
        option.CompletionSources.Clear();
        option.CompletionSources.Add(FormatWords);
        return option;
    }

    private static Option<int> NewTop()
    {
        Option<int> option = TypedOptions.Whole("--top", 0, "Rows that a table shows; 0 shows all. Files get all in any case.", TextTable.UsualRows);
        option.Recursive = true;
        return option;
    }

    /// <summary>Reads NAME=HEADER,...</summary>
    /// <exception cref="UsageException">It cannot be read.</exception>
    public static ColumnMap ParseColumns(string columns, IReadOnlyList<string> ourNames)
    {
        try
        {
            return ColumnMap.Parse(columns, ourNames);
        }
        catch (LoadingException error)
        {
            throw new UsageException($"--columns: {error.Message}");
        }
    }
}
