using System.Text;
using CarryTest.Market.Faults;

namespace CarryTest.Rules.Toml;

/// <summary>Reads a small text file: UTF-8, with or without a byte order mark.</summary>
internal static class TextFile
{
    private const long MostBytes = 16 << 20;

    /// <summary>The whole text.</summary>
    /// <param name="path">the file</param>
    /// <param name="what">what it is, for messages: `the rule book`</param>
    /// <param name="askedFor">where the file is named; null: on the command line</param>
    /// <exception cref="InputException">the file is missing, cannot be read, is too large or is not UTF-8</exception>
    public static string Read(string path, string what, Place? askedFor = null)
    {
        string from = askedFor is { } place ? $"{place}: " : "";
        try
        {
            if (!File.Exists(path))
            {
                string found = Directory.Exists(path) ? "is a folder" : "does not exist";
                throw new InputException($"{from}{what} {path} {found}; a file is expected there");
            }

            if (new FileInfo(path).Length > MostBytes)
            {
                throw new InputException($"{from}{what} {path} is larger than 16 MiB, which no such file is");
            }

            using var reader = new StreamReader(path, new UTF8Encoding(encoderShouldEmitUTF8Identifier: false, throwOnInvalidBytes: true));
            return reader.ReadToEnd();
        }
        catch (DecoderFallbackException fault)
        {
            throw new InputException($"{from}{what} {path} is not text in UTF-8; save it in that encoding", fault);
        }
        catch (Exception fault) when (fault is IOException or UnauthorizedAccessException or NotSupportedException or ArgumentException)
        {
            throw new InputException($"{from}{what} {path} cannot be read: {fault.Message}", fault);
        }
    }
}
