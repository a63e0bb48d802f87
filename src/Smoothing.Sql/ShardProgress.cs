namespace Smoothing.Sql;

/// <summary>Progress over shards and both passes, told from 0 to 1 and never backwards.</summary>
internal sealed class ShardProgress(IProgress<double>? listener, int shards)
{
    private readonly Lock _lock = new();
    private int _done;

    public void Done()
    {
        lock (_lock)
        {
            _done++;
            listener?.Report(_done / (2.0 * shards));
        }
    }
}
