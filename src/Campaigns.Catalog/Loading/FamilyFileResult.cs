using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>What a file of families says.</summary>
/// <param name="Families">The families in the order of the file; rows with problems are left out.</param>
/// <param name="Problems">What is wrong with the file; unless empty, nothing of it may be taken over.</param>
/// <param name="IgnoredColumns">Headers of columns that are not used, for a notice.</param>
public sealed record FamilyFileResult(IReadOnlyList<Family> Families, ImportProblems Problems, IReadOnlyList<string> IgnoredColumns);
