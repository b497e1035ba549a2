using System.Text;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Codes of experiments in one line of text, parted by commas; a code with a comma, a quote or a blank at its end stands in quotes, a quote in it is doubled.</summary>
internal static class CodeList
{
    /// <summary>Writes codes.</summary>
    /// <param name="codes">The codes.</param>
    public static string Write(IEnumerable<string> codes) => string.Join(", ", codes.Select(Quoted));

    /// <summary>Reads what was typed; empty entries are passed over.</summary>
    /// <param name="typed">Codes, parted by commas.</param>
    public static IReadOnlyList<string> Read(string typed) => [.. Split(typed).Select(p => p.Code).Where(c => c.Length > 0)];

    /// <summary>Completes the last code of a line.</summary>
    /// <param name="typed">What was typed so far.</param>
    /// <param name="known">Codes with their titles.</param>
    public static IReadOnlyList<Suggestion> Complete(string typed, IEnumerable<(string Code, string Title)> known)
    {
        (string last, int start) = Split(typed)[^1];
        HashSet<string> named = [.. Read(typed[..start])];
        return [.. StartingWith(last, known.Where(k => !named.Contains(k.Code))).Select(s => s with { Text = typed[..start] + Quoted(s.Text) })];
    }

    /// <summary>The known codes that begin with a text.</summary>
    /// <param name="typed">The text.</param>
    /// <param name="known">Codes with their titles.</param>
    public static IReadOnlyList<Suggestion> StartingWith(string typed, IEnumerable<(string Code, string Title)> known) =>
        [.. known.Where(k => k.Code.StartsWith(typed, StringComparison.Ordinal)).Select(k => new Suggestion(k.Code, k.Title.Length > 0 ? $"{k.Code}  {k.Title}" : k.Code))];

    private static string Quoted(string code) =>
        code.AsSpan().ContainsAny(',', '"') || code.Trim() != code ? $"\"{code.Replace("\"", "\"\"", StringComparison.Ordinal)}\"" : code;

    /// <summary>The entries with the places at which they begin; there is at least one.</summary>
    private static List<(string Code, int Start)> Split(string typed)
    {
        List<(string, int)> entries = [];
        for (int at = 0; ;)
        {
            while (at < typed.Length && typed[at] == ' ')
            {
                at++;
            }

            int start = at;
            string code = at < typed.Length && typed[at] == '"' ? ReadQuoted(typed, ref at) : "";
            int end = typed.IndexOf(',', at) is var comma && comma < 0 ? typed.Length : comma;
            entries.Add(((code + typed[at..end]).TrimEnd(' ') is var plain && code.Length > 0 ? code : plain, start));
            if (end == typed.Length)
            {
                return entries;
            }

            at = end + 1;
        }
    }

    private static string ReadQuoted(string typed, ref int at)
    {
        StringBuilder code = new();
        for (at++; at < typed.Length; at++)
        {
            if (typed[at] != '"')
            {
                code.Append(typed[at]);
            }
            else if (at + 1 < typed.Length && typed[at + 1] == '"')
            {
                code.Append(typed[++at]);
            }
            else
            {
                at++;
                break;
            }
        }

        return code.ToString();
    }
}
