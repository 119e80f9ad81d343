using System.Globalization;
using CarryTest.Market.Faults;
using Parquet;
using Parquet.Meta;
using Parquet.Schema;

namespace CarryTest.History.Reading;

/// <summary>Reads one column of a chain file as the integers that are stored.</summary>
/// <param name="path">of the file, for messages</param>
/// <param name="field">the column's name over plain integers, optional or not as in the file</param>
/// <param name="physical">how its values are stored; every row group must say the same</param>
internal sealed class RawColumn(string path, DataField field, Parquet.Meta.Type physical)
{
    /// <summary>The values of a row group.</summary>
    /// <exception cref="InputException">it cannot be decoded, or a row has no value</exception>
    public T[] Read<T>(ParquetRowGroupReader reader, int group)
        where T : struct => Decode<T>(reader, group, null);

    /// <summary>The values of a row group, <paramref name="missing"/> where a row has none.</summary>
    public T[] Read<T>(ParquetRowGroupReader reader, int group, T missing)
        where T : struct => Decode<T>(reader, group, missing);

    /// <summary>Prices per share, 0 where a row has none.</summary>
    public double[] ReadPrices(ParquetRowGroupReader reader, int group)
    {
        if (physical == Parquet.Meta.Type.INT64)
        {
            return Array.ConvertAll(Read(reader, group, 0L), units => units / ChainLayout.PriceUnit);
        }

        int[] narrow = Read(reader, group, 0);
        double[] prices = new double[narrow.Length];
        for (int row = 0; row < prices.Length; row++)
        {
            prices[row] = narrow[row] / ChainLayout.PriceUnit;
        }

        return prices;
    }

    private T[] Decode<T>(ParquetRowGroupReader reader, int group, T? missing)
        where T : struct
    {
        try
        {
            // The library checks none of this, and would hand over numbers that mean nothing.
            ColumnMetaData chunk = reader.GetMetadata(field)?.MetaData ?? throw new InvalidDataException("it has no data");
            if (chunk.Type != physical || chunk.NumValues != reader.RowCount)
            {
                throw new InvalidDataException(
                    string.Create(CultureInfo.InvariantCulture, $"{chunk.NumValues} values stored as {chunk.Type} for {reader.RowCount} rows stored as {physical}"));
            }

            T[] values = new T[(int)reader.RowCount];
            int[]? present = field.IsNullable ? new int[values.Length] : null;
            reader.ReadRawAsync<T>(field, values, present is null ? null : (Memory<int>?)present, null).AsTask().GetAwaiter().GetResult();
            if (present is not null)
            {
                Spread(values, present, group, missing);
            }

            return values;
        }
        catch (Exception e) when (e is not (InputException or OperationCanceledException))
        {
            throw new InputException(
                string.Create(CultureInfo.InvariantCulture, $"{path}, row group {group}, column {field.Name}: cannot be decoded ({e.Message}). Copy the file again from where it came."), e);
        }
    }

    // What is there comes packed at the front: it is moved to its rows from the end.
    private void Spread<T>(T[] values, int[] present, int group, T? missing)
        where T : struct
    {
        int packed = 0;
        foreach (int level in present)
        {
            packed += level;
        }

        if (packed == values.Length)
        {
            return;
        }

        if (missing is not { } filler)
        {
            throw new InputException(string.Create(
                CultureInfo.InvariantCulture,
                $"{path}, row group {group}, row {Array.IndexOf(present, 0)}, column {field.Name}: is null; every row needs a value there. Mend or leave out such rows and write the file again."));
        }

        for (int row = values.Length - 1; row >= 0; row--)
        {
            values[row] = present[row] != 0 ? values[--packed] : filler;
        }
    }
}
