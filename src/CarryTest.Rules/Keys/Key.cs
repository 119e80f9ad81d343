using System.Text.Json.Nodes;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>One key of a file: its name below the table that its list belongs to, and what it means.</summary>
/// <param name="path">dotted</param>
/// <param name="sentence">plain English, with units</param>
internal abstract class Key(string path, string sentence)
{
    public string Path { get; } = path;

    public string Sentence { get; } = sentence;

    /// <summary>Why the key may not be written in this version; null: it may.</summary>
    public string? Later { get; init; }

    /// <summary>Whether the file must give it.</summary>
    public bool Required { get; init; }

    /// <summary>What a required key that is missing is about, beyond that it is missing.</summary>
    public string MissingHint { get; init; } = "";

    /// <summary>Completes `must be ...`.</summary>
    public abstract string Expected { get; }

    /// <summary>The default as TOML; null: none.</summary>
    public virtual string? DefaultText => null;

    /// <summary>What holds where the key is not written: the default, or words.</summary>
    public virtual string WhenAbsent => DefaultText ?? "";

    public virtual IReadOnlyList<(string Word, string Sentence)> Words => [];

    public virtual IReadOnlyList<string> LaterWords => [];

    public abstract JsonObject Schema();

    /// <summary>Adds what is wrong with a value.</summary>
    /// <param name="node">the value</param>
    /// <param name="shown">the key as the file names it, from the top</param>
    /// <param name="keyAt">where the key stands</param>
    /// <param name="problems">takes what is wrong</param>
    public void Check(Node node, string shown, Place keyAt, Problems problems)
    {
        if (Later is { } later)
        {
            problems.Add(keyAt, $"`{shown}` has no effect in this version: {later}; take the key out");
            return;
        }

        CheckValue(node, shown, problems);
    }

    /// <summary>The value in canonical TOML; the value must be free of faults.</summary>
    public abstract string Text(Node node);

    protected abstract void CheckValue(Node node, string shown, Problems problems);
}

/// <summary>A key that holds one value.</summary>
internal sealed class Key<T>(string path, Form<T> form, string sentence) : Key(path, sentence)
{
    private readonly string? _whenAbsent;
    private readonly T _default = default!;

    public Form<T> Form => form;

    /// <summary>Whether there is a default.</summary>
    public bool HasDefault { get; private init; }

    /// <summary>The value where the key is not written.</summary>
    public T Default
    {
        get => HasDefault ? _default : throw new InvalidOperationException($"{Path} has no default");
        init
        {
            _default = value;
            HasDefault = true;
        }
    }

    /// <summary>In words, what holds where the key is not written and no value says it.</summary>
    public string Otherwise
    {
        init => _whenAbsent = value;
    }

    public override string Expected => form.Expected;

    public override string? DefaultText => HasDefault ? form.Write(_default) : null;

    public override string WhenAbsent => DefaultText ?? _whenAbsent ?? "";

    public override IReadOnlyList<(string Word, string Sentence)> Words => form.Words;

    public override IReadOnlyList<string> LaterWords => form.LaterWords;

    public override JsonObject Schema() => form.Schema();

    public override string Text(Node node) => form.Write(form.Read(node).Value);

    protected override void CheckValue(Node node, string shown, Problems problems)
    {
        Taken<T> taken = form.Read(node);
        if (taken.Fault is { } fault)
        {
            problems.Add(taken.At, fault(shown));
        }
    }
}
