namespace Campaigns.Catalog.Loading;

/// <summary>Opens files for reading and turns what the system says into one sentence.</summary>
internal static class FileOpening
{
    /// <summary>Opens a file to be read once from start to end.</summary>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static Stream Open(string path)
    {
        ArgumentNullException.ThrowIfNull(path);
        try
        {
            return new FileStream(path, new FileStreamOptions { BufferSize = 0, Options = FileOptions.SequentialScan });
        }
        catch (Exception e) when (IsOfTheWorld(e))
        {
            throw Explain(path, e);
        }
    }

    /// <summary>Whether an exception tells of the file system, not of our own error.</summary>
    public static bool IsOfTheWorld(Exception exception) =>
        exception is IOException or UnauthorizedAccessException or NotSupportedException or ArgumentException or System.Security.SecurityException;

    /// <summary>The sentence for an exception of the file system.</summary>
    public static LoadingException Explain(string path, Exception cause)
    {
        string shown = ShownText.Path(path);
        string sentence = cause switch
        {
            _ when Directory.Exists(path) => $"{shown} is a folder: name a file.",
            FileNotFoundException or DirectoryNotFoundException => $"{shown} is not there: check the name.",
            UnauthorizedAccessException => $"{shown} may not be read: check its permissions.",
            ArgumentException or NotSupportedException => $"{shown} is not a file name: check the name.",
            _ => $"{shown} cannot be read ({cause.Message.TrimEnd('.')}).",
        };
        return new LoadingException(sentence, cause);
    }
}
