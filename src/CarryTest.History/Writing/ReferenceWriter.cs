using System.Globalization;
using System.Text;
using CarryTest.Market.Reference;
using CarryTest.Market.Words;

namespace CarryTest.History.Writing;

/// <summary>Writes the reference tables of a history as CSV: reference/NAME.csv, invariant, one header row. Empty tables are not written.</summary>
public static class ReferenceWriter
{
    /// <summary>Writes all tables.</summary>
    /// <param name="folder">the history</param>
    /// <param name="tables">the rows, in the order in which they are written</param>
    public static void Write(string folder, ReferenceTables tables)
    {
        string reference = Path.Combine(folder, "reference");
        Directory.CreateDirectory(reference);
        Table(reference, "underlyings", "symbol,name,kind,calendar,currency", tables.Underlyings, u => [u.Symbol, u.Name, u.Kind.Word(), u.Calendar, u.Currency]);
        Table(reference, "roots", "root,symbol,exercise,settles,multiplier,deliverable_shares,deliverable_cash", tables.Roots,
            r => [r.Root, r.Symbol, r.Exercise.Word(), r.Settles.Word(), Text(r.Multiplier), Text(r.DeliverableShares), Text(r.DeliverableCash)]);
        Table(reference, "dividends", "symbol,declared_on,ex_on,record_on,paid_on,amount,kind,adjusts", tables.Dividends,
            d => [d.Symbol, Text(d.DeclaredOn), Text(d.ExOn), Text(d.RecordOn), Text(d.PaidOn), Text(d.Amount), d.Kind.Word(), d.Adjusts ? "true" : "false"], d => d.KnownAt);
        Table(reference, "rates", "as_of,days,rate", tables.Rates, r => [Text(r.AsOf), Text(r.Days), Text(r.Rate)], r => r.KnownAt);
        Table(reference, "borrow", "symbol,as_of,fee,available,recalled", tables.Borrow,
            b => [b.Symbol, Text(b.AsOf), Text(b.Fee), b.Available?.ToString(CultureInfo.InvariantCulture) ?? "", b.Recalled ? "true" : "false"], b => b.KnownAt);
        Table(reference, "corporate_actions", "symbol,announced_on,effective_on,kind,new_shares,old_shares,cash,new_root", tables.CorporateActions,
            a => [a.Symbol, Text(a.AnnouncedOn), Text(a.EffectiveOn), a.Kind.Word(), Text(a.NewShares), Text(a.OldShares), Text(a.Cash), a.NewRoot ?? ""], a => a.KnownAt);
        Table(reference, "settlements", "root,expiry,price", tables.Settlements, s => [s.Root, Text(s.Expiry), Text(s.Price)]);
        Table(reference, "closes", "symbol,date,close", tables.Closes, c => [c.Symbol, Text(c.Date), Text(c.Close)]);
    }

    /// <summary>Writes one table of text cells.</summary>
    public static void Table<T>(string folder, string name, string header, IReadOnlyList<T> rows, Func<T, string[]> cellsOf)
    {
        if (rows.Count == 0)
        {
            return;
        }

        var text = new StringBuilder().Append(header).Append('\n');
        foreach (T row in rows)
        {
            text.AppendJoin(',', cellsOf(row).Select(Quoted)).Append('\n');
        }

        File.WriteAllText(Path.Combine(folder, name + ".csv"), text.ToString(), new UTF8Encoding(false));
    }

    /// <summary>With the column `known_at` where any row has one.</summary>
    private static void Table<T>(string folder, string name, string header, IReadOnlyList<T> rows, Func<T, string[]> cellsOf, Func<T, DateTime?> knownAt)
    {
        if (rows.All(row => knownAt(row) is null))
        {
            Table(folder, name, header, rows, cellsOf);
            return;
        }

        Table(folder, name, header + ",known_at", rows, row => [.. cellsOf(row), knownAt(row)?.ToString("yyyy-MM-dd'T'HH:mm:ss.FFFFFFF'Z'", CultureInfo.InvariantCulture) ?? ""]);
    }

    private static string Quoted(string cell) => cell.AsSpan().IndexOfAny(",\"\n\r") < 0 ? cell : "\"" + cell.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";

    private static string Text(DateOnly? date) => date?.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) ?? "";

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string Text(double number) => number.ToString("R", CultureInfo.InvariantCulture);
}
