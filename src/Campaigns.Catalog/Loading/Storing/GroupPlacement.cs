using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Finds the place of an experiment's labels in its group set, or the set that they call for.</summary>
/// <remarks>Experiments that name the same labels in the same order, which is nearly all, are answered from memory.</remarks>
internal sealed class GroupPlacement(GroupSets sets, Utf8Interner labels)
{
    private readonly Dictionary<Request, Placement> _known = [];

    /// <summary>Where the labels go.</summary>
    /// <param name="SetId">The set; for groups that come with the data possibly a new, larger one.</param>
    /// <param name="Positions">Place in the set of each of the experiment's labels, -1 for one that the plan does not name.</param>
    public sealed record Placement(long SetId, int[] Positions)
    {
        public bool HasUnknown { get; } = Positions.Contains(-1);
    }

    public Placement Find(KnownExperiment experiment, ReadOnlySpan<int> ids)
    {
        var request = new Request(experiment.GroupSetId ?? 0, experiment.GroupsArePlanned, ids);
        if (!_known.TryGetValue(request, out Placement? placement))
        {
            string[] names = [.. ids.ToArray().Select(labels.Text)];
            _known[request] = placement = experiment.GroupsArePlanned ? InPlan(experiment, names) : WithData(experiment, names);
        }

        return placement;
    }

    private Placement InPlan(KnownExperiment experiment, string[] names)
    {
        string[] planned = sets.Labels(experiment.GroupSetId);
        return new Placement(experiment.GroupSetId!.Value, [.. names.Select(name => Array.IndexOf(planned, name))]);
    }

    /// <summary>New labels come after the known ones, each part in natural order, so that the order of a file's rows changes nothing.</summary>
    private Placement WithData(KnownExperiment experiment, string[] names)
    {
        string[] known = sets.Labels(experiment.GroupSetId);
        string[] all = [.. known, .. names.Except(known, StringComparer.Ordinal).Order(NaturalOrder.Instance)];
        return new Placement(sets.IdOf(all), [.. names.Select(name => Array.IndexOf(all, name))]);
    }

    private readonly struct Request : IEquatable<Request>
    {
        private readonly long _set;
        private readonly bool _planned;
        private readonly int[] _ids;
        private readonly int _hash;

        public Request(long set, bool planned, ReadOnlySpan<int> ids)
        {
            _set = set;
            _planned = planned;
            _ids = ids.ToArray();
            var hash = default(HashCode);
            hash.Add(set);
            hash.AddBytes(System.Runtime.InteropServices.MemoryMarshal.AsBytes(ids));
            _hash = hash.ToHashCode();
        }

        public bool Equals(Request other) => _set == other._set && _planned == other._planned && _ids.AsSpan().SequenceEqual(other._ids);

        public override bool Equals(object? obj) => obj is Request other && Equals(other);

        public override int GetHashCode() => _hash;
    }
}
