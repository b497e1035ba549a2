using System.Buffers.Text;

namespace Campaigns.Benchmarks.Generating;

/// <summary>Writes rows of measurements as UTF-8: experiment, group, replicate, run order and the value with four decimals.</summary>
internal sealed class RowWriter
{
    private const int LongestRow = 80;
    private readonly byte[] _buffer = new byte[1 << 18];
    private readonly Stream _output;
    private readonly SyntheticCampaign _campaign;
    private int _used;

    public RowWriter(Stream output, SyntheticCampaign campaign)
    {
        _output = output;
        _campaign = campaign;
        Put("experiment,group,replicate,run_order,value\n"u8);
    }

    public void Write(int experiment, int cell, int run)
    {
        if (_used > _buffer.Length - LongestRow)
        {
            Flush();
        }

        int replicates = _campaign.Size.Replicates;
        Put("EXP-"u8);
        Put(experiment + 1, 6);
        Put(",G"u8);
        Put((cell / replicates) + 1, 1);
        Put(","u8);
        Put((cell % replicates) + 1, 1);
        Put(","u8);
        Put(run, 1);
        Put(","u8);
        PutReading(_campaign.Reading(experiment, cell));
        Put("\n"u8);
    }

    public void Flush()
    {
        _output.Write(_buffer, 0, _used);
        _used = 0;
    }

    private void PutReading(long reading)
    {
        if (reading < 0)
        {
            Put("-"u8);
        }

        (long whole, long rest) = Math.DivRem(Math.Abs(reading), 10_000);
        Put(whole, 1);
        Put("."u8);
        Put(rest, 4);
    }

    private void Put(ReadOnlySpan<byte> text)
    {
        text.CopyTo(_buffer.AsSpan(_used));
        _used += text.Length;
    }

    private void Put(long number, byte digits)
    {
        Utf8Formatter.TryFormat(number, _buffer.AsSpan(_used), out int written, new System.Buffers.StandardFormat('D', digits));
        _used += written;
    }
}
