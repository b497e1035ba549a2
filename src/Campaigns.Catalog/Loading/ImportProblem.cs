namespace Campaigns.Catalog.Loading;

/// <summary>One reason why a file is refused.</summary>
/// <param name="File">The file's name as shown.</param>
/// <param name="Line">The physical line, from 1; 0 where the whole file is meant.</param>
/// <param name="Column">The column's name or number; empty where the whole line is meant.</param>
/// <param name="Code">The frozen, short name of the kind of problem, such as <c>decimal-comma</c>.</param>
/// <param name="Text">What is wrong and what to do, in one sentence.</param>
public sealed record ImportProblem(string File, long Line, string Column, string Code, string Text)
{
    /// <summary>The problem as one sentence with its place.</summary>
    public override string ToString()
    {
        string line = Line > 0 ? FormattableString.Invariant($" line {Line}") : "";
        string column = Column.Length > 0 ? $"{(Line > 0 ? "," : "")} column {Column}" : "";
        return $"{File}{line}{column}: {Text}";
    }
}
