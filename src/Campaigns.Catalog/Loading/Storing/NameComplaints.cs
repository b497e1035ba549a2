namespace Campaigns.Catalog.Loading;

/// <summary>Names that a file may not use, each told once, at the first line that uses it, with the number of rows.</summary>
internal sealed class NameComplaints
{
    private readonly Dictionary<string, Complaint> _complaints = new(StringComparer.Ordinal);

    public bool IsEmpty => _complaints.Count == 0;

    /// <summary>Counts one more row for a complaint.</summary>
    /// <param name="column">The file's column.</param>
    /// <param name="code">The frozen, short name of the kind of problem.</param>
    /// <param name="key">What makes the complaint one of its own.</param>
    /// <param name="line">The row's line.</param>
    /// <param name="rows">Rows to count.</param>
    /// <param name="text">What is wrong and what to do; asked for once.</param>
    public void Add(string column, string code, string key, long line, long rows, Func<string> text)
    {
        string full = $"{code}\n{key}";
        if (!_complaints.TryGetValue(full, out Complaint? complaint))
        {
            _complaints[full] = complaint = new Complaint(column, code, line, text());
        }

        complaint.Line = Math.Min(complaint.Line, line);
        complaint.Rows += rows;
    }

    public void Clear() => _complaints.Clear();

    /// <summary>Adds the complaints to the file's problems, in the order of their lines.</summary>
    public void ReportTo(ImportProblems problems, string file)
    {
        foreach (Complaint complaint in _complaints.Values.OrderBy(c => c.Line).ThenBy(c => c.Code, StringComparer.Ordinal))
        {
            string rows = complaint.Rows > 1 ? FormattableString.Invariant($" ({complaint.Rows} rows)") : "";
            problems.Add(new ImportProblem(file, complaint.Line, complaint.Column, complaint.Code, complaint.Text + rows));
        }
    }

    private sealed class Complaint(string column, string code, long line, string text)
    {
        public string Column { get; } = column;

        public string Code { get; } = code;

        public string Text { get; } = text;

        public long Line { get; set; } = line;

        public long Rows { get; set; }
    }
}
