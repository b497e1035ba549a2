namespace Campaigns.Catalog.Loading;

/// <summary>Why a name is refused.</summary>
/// <param name="Code">The frozen, short name of the kind of fault.</param>
/// <param name="Text">What is wrong and what to do.</param>
internal sealed record NameFault(string Code, string Text);
