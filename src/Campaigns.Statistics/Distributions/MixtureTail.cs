namespace Campaigns.Statistics.Distributions;

/// <summary>A tail of the noncentral F law.</summary>
/// <param name="Log">Its natural logarithm.</param>
/// <param name="Steepness">How fast it changes with lambda: twice the size of the derivative of its logarithm; the upper tail rises, the lower falls.</param>
internal readonly record struct MixtureTail(double Log, double Steepness);
