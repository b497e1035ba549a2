using System.Text.Json.Serialization;

namespace Campaigns.Catalog.Results;

/// <summary>Lists that are handed to SQLite as JSON, so that one statement looks up all of them; written without reflection.</summary>
[JsonSerializable(typeof(string[]))]
[JsonSerializable(typeof(long[]))]
internal sealed partial class JsonArrays : JsonSerializerContext;
