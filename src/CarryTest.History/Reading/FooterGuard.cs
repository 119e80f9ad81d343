using System.Buffers.Binary;
using CarryTest.Market.Faults;

namespace CarryTest.History.Reading;

/// <summary>
/// Looks at the head and tail of a Parquet file before the library opens it, and walks its footer once: a broken footer can make an open spin for ever or end the process.
/// Refused are numbers that do not end, lists longer than the bytes left, and nesting deeper than a flat table has.
/// </summary>
internal static class FooterGuard
{
    private const int MostDepth = 16;
    private static ReadOnlySpan<byte> Magic => "PAR1"u8;

    /// <summary>Refuses a file that is not safe to open.</summary>
    /// <exception cref="InputException">says what is wrong with the file</exception>
    public static void Check(string path)
    {
        using FileStream stream = File.OpenRead(path);
        if (stream.Length < 12)
        {
            throw Refuse(path, stream.Length == 0 ? "is empty" : "is too short for a Parquet file");
        }

        Span<byte> head = stackalloc byte[4];
        Span<byte> tail = stackalloc byte[8];
        stream.ReadExactly(head);
        stream.Seek(-8, SeekOrigin.End);
        stream.ReadExactly(tail);
        if (!head.SequenceEqual(Magic))
        {
            throw Refuse(path, "is not a Parquet file: it does not begin with PAR1");
        }

        if (!tail[4..].SequenceEqual(Magic))
        {
            throw Refuse(path, "is cut short: it does not end with PAR1");
        }

        int length = BinaryPrimitives.ReadInt32LittleEndian(tail);
        if (length <= 0 || length > stream.Length - 12)
        {
            throw Refuse(path, $"has a footer length of {length} bytes, which the file of {stream.Length} bytes cannot hold");
        }

        var footer = new byte[length];
        stream.Seek(-8 - length, SeekOrigin.End);
        stream.ReadExactly(footer);
        int at = 0;
        if (!Struct(footer, ref at, 0) || at != length)
        {
            throw Refuse(path, "has a broken footer");
        }
    }

    private static InputException Refuse(string path, string what) => new($"{path}: {what}. Copy the file again from where it came.");

    // Thrift compact protocol: a field header holds the type in its low and the id delta in its high nibble.
    private static bool Struct(ReadOnlySpan<byte> bytes, ref int at, int depth)
    {
        if (depth > MostDepth)
        {
            return false;
        }

        while (true)
        {
            if (at >= bytes.Length)
            {
                return false;
            }

            byte header = bytes[at++];
            if (header == 0)
            {
                return true;
            }

            if (header >> 4 == 0 && !Number(bytes, ref at, out _))
            {
                return false;
            }

            if (!Value(bytes, ref at, header & 0x0F, depth, inList: false))
            {
                return false;
            }
        }
    }

    private static bool Value(ReadOnlySpan<byte> bytes, ref int at, int type, int depth, bool inList)
    {
        switch (type)
        {
            case 1 or 2:
                at += inList ? 1 : 0;
                return at <= bytes.Length;
            case 3:
                at++;
                return at <= bytes.Length;
            case 4 or 5 or 6:
                return Number(bytes, ref at, out _);
            case 7:
                at += 8;
                return at <= bytes.Length;
            case 8:
                if (!Number(bytes, ref at, out ulong text) || text > (ulong)(bytes.Length - at))
                {
                    return false;
                }

                at += (int)text;
                return true;
            case 9 or 10:
                return List(bytes, ref at, depth);
            case 12:
                return Struct(bytes, ref at, depth + 1);
            default:
                return false;
        }
    }

    private static bool List(ReadOnlySpan<byte> bytes, ref int at, int depth)
    {
        if (at >= bytes.Length)
        {
            return false;
        }

        byte header = bytes[at++];
        ulong count = (ulong)(header >> 4);
        if (count == 15 && !Number(bytes, ref at, out count))
        {
            return false;
        }

        if (count > (ulong)(bytes.Length - at))
        {
            return false;
        }

        for (ulong i = 0; i < count; i++)
        {
            if (!Value(bytes, ref at, header & 0x0F, depth + 1, inList: true))
            {
                return false;
            }
        }

        return true;
    }

    private static bool Number(ReadOnlySpan<byte> bytes, ref int at, out ulong value)
    {
        value = 0;
        for (int i = 0; i < 10; i++)
        {
            if (at >= bytes.Length)
            {
                return false;
            }

            byte part = bytes[at++];
            value |= unchecked((ulong)(part & 0x7F) << (7 * i));
            if ((part & 0x80) == 0)
            {
                return true;
            }
        }

        return false;
    }
}
