namespace Campaigns.Statistics.Online;

/// <summary>Settings of an online procedure that it cannot work with; the message is one sentence for people.</summary>
/// <param name="message">What is wrong, and what would be right.</param>
public sealed class OnlineSettingsException(string message) : Exception(message);
