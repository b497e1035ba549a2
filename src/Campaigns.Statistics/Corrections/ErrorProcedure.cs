namespace Campaigns.Statistics.Corrections;

/// <summary>A published procedure that holds an error rate over many tests: a batch correction, or one that decides as experiments arrive.</summary>
public abstract class ErrorProcedure
{
    /// <summary>The short, frozen, lower-case word by which plans, files and commands name the procedure.</summary>
    public abstract string Key { get; }

    /// <summary>The procedure's published name.</summary>
    public abstract string Name { get; }

    /// <summary>The error rate that the procedure holds.</summary>
    public abstract ErrorRate Controls { get; }

    /// <summary>The dependence between the p-values under which it is proved.</summary>
    public abstract Dependence ValidUnder { get; }

    /// <summary>The guarantee in one sentence for people.</summary>
    public abstract string Guarantee { get; }

    /// <summary>Where the procedure was published.</summary>
    public abstract string Source { get; }
}
