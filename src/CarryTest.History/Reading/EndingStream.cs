using Microsoft.Win32.SafeHandles;

namespace CarryTest.History.Reading;

/// <summary>
/// A file read from any position. Reading a byte behind its end throws instead of returning -1, which the decoder would take for a byte of 255 and read on for ever.
/// </summary>
internal sealed class EndingStream(string path) : Stream
{
    private const int SmallReads = 4096;
    private readonly SafeFileHandle _handle = File.OpenHandle(path, FileMode.Open, FileAccess.Read, FileShare.Read, FileOptions.RandomAccess);
    private readonly byte[] _buffer = new byte[SmallReads];
    private long _length = -1;
    private long _position;
    private long _bufferStart = -1;
    private int _buffered;

    public override bool CanRead => true;

    public override bool CanSeek => true;

    public override bool CanWrite => false;

    public override long Length => _length >= 0 ? _length : _length = RandomAccess.GetLength(_handle);

    public override long Position
    {
        get => _position;
        set => Seek(value, SeekOrigin.Begin);
    }

    public override int Read(Span<byte> buffer)
    {
        int read = RandomAccess.Read(_handle, buffer, _position);
        _position += read;
        return read;
    }

    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    public override ValueTask<int> ReadAsync(Memory<byte> buffer, CancellationToken cancellationToken = default) => new(Read(buffer.Span));

    public override Task<int> ReadAsync(byte[] buffer, int offset, int count, CancellationToken cancellationToken) => Task.FromResult(Read(buffer.AsSpan(offset, count)));

    public override int ReadByte()
    {
        if (_bufferStart < 0 || _position < _bufferStart || _position >= _bufferStart + _buffered)
        {
            _buffered = RandomAccess.Read(_handle, _buffer, _position);
            _bufferStart = _position;
            if (_buffered <= 0)
            {
                _bufferStart = -1;
                throw new EndOfStreamException("reads behind the end of the file");
            }
        }

        int value = _buffer[(int)(_position - _bufferStart)];
        _position++;
        return value;
    }

    public override long Seek(long offset, SeekOrigin origin)
    {
        long target = origin switch
        {
            SeekOrigin.Begin => offset,
            SeekOrigin.Current => _position + offset,
            _ => Length + offset,
        };
        return target >= 0 && target <= Length ? _position = target : throw new EndOfStreamException("seeks behind the end of the file");
    }

    public override void Flush()
    {
    }

    public override void SetLength(long value) => throw new NotSupportedException();

    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            _handle.Dispose();
        }

        base.Dispose(disposing);
    }
}
