using System.Text.Json;
using System.Text.Json.Serialization;
using Permute.Data;

namespace Permute;

/// <summary>What request.json holds: all that was asked, by absolute paths, and what it was asked of.</summary>
internal sealed record RunRecord
{
    public string Format { get; init; } = "permute-request";

    public int Version { get; init; } = 1;

    public required string ProgramVersion { get; init; }

    public required AnalysisRequest Request { get; init; }

    public required string Fingerprint { get; init; }

    /// <summary>SHA-256 of each input file, by its path.</summary>
    public required IReadOnlyDictionary<string, string> Inputs { get; init; }
}

/// <summary>The run folder's request and where its parts lie.</summary>
internal static class RunFolder
{
    private static readonly JsonSerializerOptions Json = new()
    {
        PropertyNamingPolicy = JsonNamingPolicy.CamelCase,
        WriteIndented = true,
        Encoder = System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
        IncludeFields = true,
        Converters = { new JsonStringEnumConverter(JsonNamingPolicy.CamelCase) },
    };

    /// <summary>The program's version.</summary>
    public static string ProgramVersion { get; } = typeof(RunFolder).Assembly.GetName().Version!.ToString(3);

    public static string Chunks(string run) => Path.Combine(run, "chunks");

    public static bool Exists(string run) => File.Exists(RequestPath(run));

    /// <summary>Throws <see cref="InputException"/> when nothing can be written to the folder, before any long work; leaves nothing behind.</summary>
    public static void Probe(string run)
    {
        bool made = !Directory.Exists(run);
        string probe = Path.Combine(run, $".probe-{Guid.NewGuid():N}");
        AtomicFile.Write(probe, _ => { });
        File.Delete(probe);
        if (made) Directory.Delete(run);
    }

    /// <summary>Makes the folder and writes the request; whatever another analysis left there is removed only with --replace.</summary>
    public static void Create(string run, RunRecord record)
    {
        if (Exists(run) && Read(run).Fingerprint is string other && other != record.Fingerprint)
        {
            if (!record.Request.Replace)
                throw new InputException(
                    $"{run} holds another analysis (other data, model or options, fingerprint {other[..12]}… instead of {record.Fingerprint[..12]}…); choose another --out, or add --replace to start anew.");
            Clear(run);
        }
        else if (!Exists(run) && Directory.Exists(run) && Directory.EnumerateFileSystemEntries(run).Any(e => !IsOwn(e)))
            throw new InputException($"{run} exists, is not empty and holds no analysis of ours; choose another --out.");
        Directory.CreateDirectory(Chunks(run));
        AtomicFile.Write(RequestPath(run), stream => JsonSerializer.Serialize(stream, record, Json));
    }

    // All of the other analysis goes, reports and maps too: a map it left must not be taken for one of the new analysis.
    private static void Clear(string run)
    {
        foreach (string folder in new[] { "chunks", "maps", "figures" }.Select(f => Path.Combine(run, f)).Where(Directory.Exists)) Directory.Delete(folder, recursive: true);
        string[] files =
        [
            "summary.json", "report.html", "null-maxima.tsv.gz", "thresholds.tsv", "clusters.tsv", "peaks.tsv", "variables.tsv", "survivors.tsv", "sweep.tsv", "checks.tsv",
        ];
        foreach (string file in files) File.Delete(Path.Combine(run, file));
    }

    /// <summary>The request of a run folder. Throws <see cref="InputException"/> when it is none.</summary>
    public static RunRecord Read(string run)
    {
        string path = RequestPath(run);
        if (!File.Exists(path)) throw new InputException($"{run} is no run folder: {path} is missing; make one with permute prepare or permute test.");
        try
        {
            RunRecord? record = JsonSerializer.Deserialize<RunRecord>(File.ReadAllText(path), Json);
            if (record is not { Format: "permute-request", Version: 1 })
                throw new InputException($"{path} is not a request of version 1 of this program; make the run again with this version.");
            return record with { Request = record.Request with { Out = run } };
        }
        catch (JsonException e)
        {
            throw new InputException($"{path} cannot be read: {e.Message}", e);
        }
    }

    private static string RequestPath(string run) => Path.Combine(run, "request.json");

    // `demo` puts its made-up study inside the run folder before the run is made.
    private static bool IsOwn(string entry) => Path.GetFileName(entry) is "chunks" or "study";
}
