namespace Campaigns.Statistics.Checks;

/// <summary>A look at one assumption behind an experiment's test; advice, never a gate: one sealed class in one file, and one line in <see cref="CheckRegistry"/>.</summary>
public abstract class ExperimentCheck
{
    /// <summary>The short, frozen, lower-case word by which files name the check.</summary>
    public abstract string Key { get; }

    /// <summary>The check's name in the field's words.</summary>
    public abstract string Name { get; }

    /// <summary>What it cannot see, in a sentence with a full stop.</summary>
    public abstract string CannotSee { get; }

    /// <summary>What to do where it warns, in a sentence with a full stop.</summary>
    public abstract string Advice { get; }

    /// <summary>Where the method was published.</summary>
    public abstract string Source { get; }

    /// <summary>Looks at one experiment.</summary>
    /// <param name="subject">Its independent values and their residuals.</param>
    public abstract CheckFinding Look(CheckSubject subject);
}
