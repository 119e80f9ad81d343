using CarryTest.Carry.Journal;
using CarryTest.Market.Faults;

namespace CarryTest.Reports.Tables;

/// <summary>The ledger of one book on disk: a Parquet file a table in a folder, rows in the order in which they arrive, streamed a row group at a time. Files are whole once it is disposed. Not safe for several threads.</summary>
public sealed class ParquetLedger : ILedger, IDisposable
{
    private const int RowsPerGroup = 50_000;
    private readonly TableWriter<PackageRow> _packages;
    private readonly TableWriter<TradeRow> _trades;
    private readonly TableWriter<PostingRow> _journal;
    private readonly TableWriter<EquityRow> _equity;
    private readonly TableWriter<EventRow> _events;
    private readonly TableWriter<FunnelRow> _funnel;

    /// <summary>Begins the files of all tables.</summary>
    /// <param name="folder">is made if it is not there; must not hold these files yet</param>
    /// <param name="csv">whether each table is also written as CSV</param>
    /// <param name="rowsPerGroup">rows of a table that are kept in memory before they are written</param>
    /// <exception cref="InputException">the folder cannot be written</exception>
    public ParquetLedger(string folder, bool csv = false, int rowsPerGroup = RowsPerGroup)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(rowsPerGroup, 1);
        try
        {
            Directory.CreateDirectory(folder);
            _packages = new(folder, LedgerTables.Packages, csv, rowsPerGroup);
            _trades = new(folder, LedgerTables.Trades, csv, rowsPerGroup);
            _journal = new(folder, LedgerTables.Journal, csv, rowsPerGroup);
            _equity = new(folder, LedgerTables.Equity, csv, rowsPerGroup);
            _events = new(folder, LedgerTables.Events, csv, rowsPerGroup);
            _funnel = new(folder, LedgerTables.Funnel, csv, rowsPerGroup);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            _packages?.Dispose();
            _trades?.Dispose();
            _journal?.Dispose();
            _equity?.Dispose();
            _events?.Dispose();
            throw new InputException($"{folder}: cannot be written ({e.Message}). Choose another folder with --out.", e);
        }
    }

    /// <inheritdoc/>
    public void Write(PackageRow row) => _packages.Write(row);

    /// <inheritdoc/>
    public void Write(TradeRow row) => _trades.Write(row);

    /// <inheritdoc/>
    public void Write(PostingRow row) => _journal.Write(row);

    /// <inheritdoc/>
    public void Write(EquityRow row) => _equity.Write(row);

    /// <inheritdoc/>
    public void Write(EventRow row) => _events.Write(row);

    /// <inheritdoc/>
    public void Write(FunnelRow row) => _funnel.Write(row);

    /// <summary>Writes what waits and ends all files.</summary>
    public void Dispose()
    {
        IDisposable[] tables = [_packages, _trades, _journal, _equity, _events, _funnel];
        InputException? first = null;
        foreach (IDisposable table in tables)
        {
            try
            {
                table.Dispose();
            }
            catch (InputException e)
            {
                first ??= e;
            }
        }

        if (first is not null)
        {
            throw first;
        }
    }
}
