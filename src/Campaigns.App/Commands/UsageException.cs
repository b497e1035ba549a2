namespace Campaigns.App.Commands;

/// <summary>A command was typed in a way that means nothing; the message says what to type.</summary>
internal sealed class UsageException(string message) : Exception(message);
