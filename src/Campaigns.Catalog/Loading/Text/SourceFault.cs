namespace Campaigns.Catalog.Loading;

/// <summary>Why the bytes of a file are no text from some place on.</summary>
/// <param name="Line">The physical line, from 1.</param>
/// <param name="Code">The frozen, short name of the kind of fault.</param>
/// <param name="Text">What is wrong and what to do.</param>
internal sealed record SourceFault(long Line, string Code, string Text);
