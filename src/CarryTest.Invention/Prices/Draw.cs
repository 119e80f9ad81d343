namespace CarryTest.Invention.Prices;

/// <summary>
/// Random numbers that depend on nothing but what they are for: a seed, a name, a purpose and a counter (SplitMix64 over their hash; Steele, Lea and Flood 2014).
/// No draw changes another, whatever the order or thread.
/// </summary>
/// <param name="seed">of the market</param>
/// <param name="name">of the underlying; empty for the market</param>
/// <param name="purpose">what the numbers are for</param>
internal readonly struct Draw(int seed, string name, string purpose)
{
    private readonly ulong _key = Hash(Hash(Mix((ulong)seed), name), purpose);

    /// <summary>Uniform in (0, 1).</summary>
    public double Uniform(long counter) => (Bits(counter) + 0.5) / (1UL << 53);

    /// <summary>Standard normal (Box and Muller 1958).</summary>
    public double Normal(long counter) =>
        Math.Sqrt(-2 * Math.Log(Uniform(2 * counter))) * Math.Cos(2 * Math.PI * Uniform((2 * counter) + 1));

    /// <summary>Exponential with mean 1.</summary>
    public double Exponential(long counter) => -Math.Log(Uniform(counter));

    /// <summary>A whole number from 0 to <paramref name="count"/> - 1.</summary>
    public int Below(int count, long counter) => (int)(Uniform(counter) * count);

    private ulong Bits(long counter) => Mix(unchecked(_key + ((ulong)counter * 0x9E3779B97F4A7C15UL))) >> 11;

    private static ulong Hash(ulong key, string text)
    {
        foreach (char c in text)
        {
            key = Mix(key ^ c);
        }

        return Mix(key ^ 0xFFFF);
    }

    private static ulong Mix(ulong z)
    {
        unchecked
        {
            z += 0x9E3779B97F4A7C15UL;
            z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
            z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
            return z ^ (z >> 31);
        }
    }
}
