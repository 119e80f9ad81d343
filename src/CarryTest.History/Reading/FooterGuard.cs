using System.Buffers.Binary;
using System.Globalization;
using CarryTest.Market.Faults;

namespace CarryTest.History.Reading;

/// <summary>
/// Looks at the head and tail of a Parquet file before the library opens it, and walks its footer once (Thrift's compact protocol): a broken footer can make an open spin for ever,
/// ask for gigabytes, or end the process by a schema nested too deeply. Refused are numbers that do not end, lists longer than the bytes left, known fields of another type,
/// columns that hold columns, negative sizes, data outside the file, and bytes left over.
/// </summary>
internal static class FooterGuard
{
    private const int TailBytes = 8;
    private const int MagicBytes = 4;

    /// <summary>More rows than a group can hold in a file that is meant to be streamed.</summary>
    private const long MostRowsInGroup = 10_000_000;

    private static ReadOnlySpan<byte> Magic => "PAR1"u8;

    /// <summary>Refuses a file that is not safe to open.</summary>
    /// <exception cref="InputException">says what is wrong with the file</exception>
    public static void Check(string path)
    {
        if (Directory.Exists(path))
        {
            throw new InputException($"{path}: is a folder, a Parquet file was expected. Move it away or rename it.");
        }

        using FileStream stream = File.OpenRead(path);
        if (stream.Length < MagicBytes + TailBytes)
        {
            throw Refuse(path, stream.Length == 0 ? "is empty" : "is too short for a Parquet file");
        }

        Span<byte> head = stackalloc byte[MagicBytes];
        Span<byte> tail = stackalloc byte[TailBytes];
        stream.ReadExactly(head);
        stream.Seek(-TailBytes, SeekOrigin.End);
        stream.ReadExactly(tail);
        if (!head.SequenceEqual(Magic))
        {
            throw Refuse(path, "is not a Parquet file: it does not begin with PAR1");
        }

        if (!tail[MagicBytes..].SequenceEqual(Magic))
        {
            throw Refuse(path, "is cut short: it does not end with PAR1");
        }

        int length = BinaryPrimitives.ReadInt32LittleEndian(tail);
        if (length <= 0 || length > stream.Length - MagicBytes - TailBytes)
        {
            throw Refuse(path, string.Create(CultureInfo.InvariantCulture, $"has a footer length of {length} bytes, which the file of {stream.Length} bytes cannot hold"));
        }

        byte[] footer = new byte[length];
        stream.Seek(-TailBytes - length, SeekOrigin.End);
        stream.ReadExactly(footer);
        try
        {
            Walk walk = new(footer, stream.Length - TailBytes - length);
            walk.File();
        }
        catch (BrokenFooterException e)
        {
            throw Refuse(path, $"has a broken footer ({e.Message})");
        }
        catch (NestedColumnException e)
        {
            throw new InputException($"{path}, column {e.Message}: holds other columns; the tables of a history are flat. Write the file without it, or with its parts as columns of their own.");
        }
    }

    private static InputException Refuse(string path, string what) => new($"{path}: {what}. Copy the file again from where it came.");

    private sealed class BrokenFooterException(string message) : Exception(message);

    private sealed class NestedColumnException(string message) : Exception(message);

    /// <summary>One pass over the bytes of a footer. Field numbers are those of the format's parquet.thrift.</summary>
    private ref struct Walk(ReadOnlySpan<byte> bytes, long dataEnd)
    {
        private const int MostDepth = 12;
        private const int MostNumberBytes = 10;

        private const int True = 1;
        private const int False = 2;
        private const int Byte = 3;
        private const int Int16 = 4;
        private const int Int32 = 5;
        private const int Int64 = 6;
        private const int Double = 7;
        private const int Binary = 8;
        private const int List = 9;
        private const int Set = 10;
        private const int Struct = 12;

        private readonly ReadOnlySpan<byte> _bytes = bytes;
        private readonly long _dataEnd = dataEnd;
        private int _at;

        public void File()
        {
            short id = 0;
            while (Field(ref id, out int type))
            {
                switch (id)
                {
                    case 2:
                        Need(type, List);
                        int elements = Elements(Struct);
                        for (int i = 0; i < elements; i++)
                        {
                            SchemaElement(isRoot: i == 0);
                        }

                        break;
                    case 3:
                        Need(type, Int64);
                        NotNegative(Number(), "rows");
                        break;
                    case 4:
                        Need(type, List);
                        int groups = Elements(Struct);
                        for (int i = 0; i < groups; i++)
                        {
                            RowGroup();
                        }

                        break;
                    case 5:
                        Need(type, List);
                        Skip(type, 0);
                        break;
                    case 1:
                        Need(type, Int32);
                        Skip(type, 0);
                        break;
                    default:
                        Skip(type, 0);
                        break;
                }
            }

            if (_at != _bytes.Length)
            {
                throw new BrokenFooterException("bytes are left over");
            }
        }

        private void SchemaElement(bool isRoot)
        {
            short id = 0;
            string name = "?";
            long children = 0;
            while (Field(ref id, out int type))
            {
                switch (id)
                {
                    case 4:
                        Need(type, Binary);
                        name = System.Text.Encoding.UTF8.GetString(Text());
                        break;
                    case 5:
                        Need(type, Int32);
                        children = Number();
                        break;
                    case 1 or 2 or 3 or 6 or 7 or 8 or 9:
                        Need(type, Int32);
                        Skip(type, 0);
                        break;
                    default:
                        Skip(type, 0);
                        break;
                }
            }

            if (!isRoot && children != 0)
            {
                throw new NestedColumnException(name);
            }
        }

        private void RowGroup()
        {
            short id = 0;
            long rows = -1;
            while (Field(ref id, out int type))
            {
                switch (id)
                {
                    case 1:
                        Need(type, List);
                        int columns = Elements(Struct);
                        for (int i = 0; i < columns; i++)
                        {
                            ColumnChunk();
                        }

                        break;
                    case 3:
                        Need(type, Int64);
                        rows = Number();
                        NotNegative(rows, "rows of a row group");
                        break;
                    case 2 or 5 or 6:
                        Need(type, Int64);
                        NotNegative(Number(), "size of a row group");
                        break;
                    default:
                        Skip(type, 0);
                        break;
                }
            }

            if (rows > MostRowsInGroup)
            {
                throw new BrokenFooterException(string.Create(
                    CultureInfo.InvariantCulture, $"a row group says that it holds {rows} rows; at most {MostRowsInGroup} are read, and a history has at most 50,000"));
            }
        }

        private void ColumnChunk()
        {
            short id = 0;
            while (Field(ref id, out int type))
            {
                switch (id)
                {
                    case 1:
                        throw new BrokenFooterException("a column's values lie in another file");
                    case 3:
                        Need(type, Struct);
                        ColumnMeta();
                        break;
                    default:
                        Skip(type, 0);
                        break;
                }
            }
        }

        private void ColumnMeta()
        {
            short id = 0;
            long size = 0;
            long data = long.MaxValue;
            long dictionary = long.MaxValue;
            while (Field(ref id, out int type))
            {
                switch (id)
                {
                    case 1 or 4 or 15:
                        Need(type, Int32);
                        Skip(type, 0);
                        break;
                    case 2 or 3 or 8 or 13:
                        Need(type, List);
                        Skip(type, 0);
                        break;
                    case 5 or 6 or 7 or 9 or 10 or 11:
                        Need(type, Int64);
                        long value = Number();
                        NotNegative(value, "size or place of a column");
                        size = id == 7 ? value : size;
                        data = id == 9 ? value : data;
                        // Some writers say 0 for "no dictionary".
                        dictionary = id == 11 && value > 0 ? value : dictionary;
                        break;
                    default:
                        Skip(type, 0);
                        break;
                }
            }

            long start = Math.Min(data, dictionary);
            if (start > _dataEnd || size > _dataEnd - start)
            {
                throw new BrokenFooterException("a column's values lie outside the file");
            }
        }

        /// <summary>Reads a field's header; false at the end of a struct.</summary>
        private bool Field(ref short id, out int type)
        {
            int header = Next();
            type = header & 0x0F;
            if (header == 0)
            {
                return false;
            }

            int delta = header >> 4;
            long next = delta != 0 ? id + delta : Number();
            if (next is < 0 or > short.MaxValue)
            {
                throw new BrokenFooterException("a field has an impossible number");
            }

            id = (short)next;
            return true;
        }

        /// <summary>Reads a list's header.</summary>
        private int Elements(int expected)
        {
            int header = Next();
            ulong count = (ulong)(header >> 4);
            if (count == 15)
            {
                count = Unsigned();
            }

            if (count > (ulong)(_bytes.Length - _at))
            {
                throw new BrokenFooterException("a list is longer than the bytes that are left");
            }

            if (count > 0)
            {
                Need(header & 0x0F, expected);
            }

            return (int)count;
        }

        private void Skip(int type, int depth)
        {
            if (depth > MostDepth)
            {
                throw new BrokenFooterException("its parts are nested too deeply");
            }

            switch (type)
            {
                case True or False:
                    return;
                case Byte:
                    Take(1);
                    return;
                case Int16 or Int32 or Int64:
                    Unsigned();
                    return;
                case Double:
                    Take(8);
                    return;
                case Binary:
                    Text();
                    return;
                case List or Set:
                    SkipList(depth);
                    return;
                case Struct:
                    short id = 0;
                    while (Field(ref id, out int inner))
                    {
                        Skip(inner, depth + 1);
                    }

                    return;
                default:
                    throw new BrokenFooterException("a field has an unknown type");
            }
        }

        private void SkipList(int depth)
        {
            int type = _at < _bytes.Length ? _bytes[_at] & 0x0F : 0;
            int count = Elements(type);
            for (int i = 0; i < count; i++)
            {
                // In a list a truth value takes a byte; as a field it sits in the header.
                Skip(type is True or False ? Byte : type, depth + 1);
            }
        }

        private ReadOnlySpan<byte> Text()
        {
            ulong length = Unsigned();
            if (length > (ulong)(_bytes.Length - _at))
            {
                throw new BrokenFooterException("a text is longer than the bytes that are left");
            }

            return Take((int)length);
        }

        private long Number()
        {
            ulong zigzag = Unsigned();
            return (long)(zigzag >> 1) ^ -(long)(zigzag & 1);
        }

        private ulong Unsigned()
        {
            ulong value = 0;
            for (int i = 0; i < MostNumberBytes; i++)
            {
                int part = Next();
                value |= unchecked((ulong)(part & 0x7F) << (7 * i));
                if ((part & 0x80) == 0)
                {
                    return value;
                }
            }

            throw new BrokenFooterException("a number does not end");
        }

        private int Next() => Take(1)[0];

        private ReadOnlySpan<byte> Take(int count)
        {
            if (count > _bytes.Length - _at)
            {
                throw new BrokenFooterException("it ends too soon");
            }

            ReadOnlySpan<byte> taken = _bytes.Slice(_at, count);
            _at += count;
            return taken;
        }

        private static void Need(int type, int expected)
        {
            if (type != expected)
            {
                throw new BrokenFooterException("a field has another type than the format says");
            }
        }

        private static void NotNegative(long value, string what)
        {
            if (value < 0)
            {
                throw new BrokenFooterException($"the {what} is negative");
            }
        }
    }
}
