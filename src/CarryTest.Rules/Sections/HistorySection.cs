using System.Collections.Immutable;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;
using CarryTest.Studies;

namespace CarryTest.Rules.Sections;

/// <summary>`[history]`.</summary>
internal static class HistorySection
{
    private static readonly HistorySettings Usual = new() { Folder = "" };

    private static readonly Key<string> Folder = new("history.folder", Forms.Path("the history's folder"), "The folder of the history.")
    {
        Required = true,
        MissingHint = "name the folder of the history, as folder = \"../data-sample\" under [history]",
    };

    private static readonly Key<DateOnly> From = new("history.from", Forms.Date(), "First day, included.") { Otherwise = "the first day of the history" };

    private static readonly Key<DateOnly> To = new("history.to", Forms.Date(), "Last day, included.") { Otherwise = "the last day of the history" };

    private static readonly Key<ImmutableArray<string>> Underlyings =
        new("history.underlyings", Forms.List(Forms.Text("a name in quotes without spaces, `*` and `?` stand for any letters", s => !s.Any(char.IsWhiteSpace)), "names", mayBeEmpty: false), "Underlyings that are read; `*` stands for any letters, `?` for one.")
        {
            Default = Usual.Underlyings,
        };

    private static readonly Key<OnError> OnError = new("history.on_error", Forms.Word<OnError>(), "What happens to rows with errors.") { Default = Usual.OnError };

    public static readonly IReadOnlyList<Key> Keys = [Folder, From, To, Underlyings, OnError];

    public static HistorySettings Bind(Values values, string home) => new()
    {
        Folder = System.IO.Path.GetFullPath(System.IO.Path.Combine(home, values.Of(Folder))),
        From = values.Written(From),
        To = values.Written(To),
        Underlyings = values.Of(Underlyings),
        OnError = values.Of(OnError),
    };

    public static void Check(Values values, string prefix, Problems problems)
    {
        if (values.Written(From) is { } from && values.Written(To) is { } to && from > to)
        {
            problems.Add(values.PlaceOf(To), $"`{prefix}{To.Path}`, {To.Text(values.NodeOf(To)!)}, lies before `{prefix}{From.Path}`, {From.Text(values.NodeOf(From)!)}");
        }
    }
}
