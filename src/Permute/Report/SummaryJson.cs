using System.Collections;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Serialization;
using Permute.Data;
using Permute.Inference;

namespace Permute.Report;

/// <summary>summary.json: every number of the report, doubles in their shortest round-trip form, infinite ones as "Infinity", missing ones as null.</summary>
public static class SummaryJson
{
    private static readonly JsonSerializerOptions Options = new()
    {
        PropertyNamingPolicy = JsonNamingPolicy.CamelCase,
        NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals,
        Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
        WriteIndented = true,
        NewLine = "\n",
        Converters = { new NumberPairOrText() },
    };

    /// <summary>The text of summary.json; a preview or thresholds by theory alone are written by the same rules.</summary>
    public static string Text<T>(T summary) => JsonSerializer.Serialize(summary, Options) + "\n";

    /// <summary>Writes it to <paramref name="path"/>, aside and then renamed.</summary>
    public static void Write(string path, Summary summary) => AtomicFile.Write(path, to => Write(to, summary));

    /// <summary>Writes it to a stream, UTF-8.</summary>
    public static void Write(Stream to, Summary summary)
    {
        JsonSerializer.Serialize(to, summary, Options);
        to.Write("\n"u8);
    }

    /// <summary>Reads a summary.json back.</summary>
    /// <exception cref="InputException">The file is no summary of version 1.</exception>
    public static Summary Read(string path)
    {
        try
        {
            using var stream = File.OpenRead(path);
            var summary = JsonSerializer.Deserialize<Summary>(stream, Options);
            if (summary is not { Format: "permute-summary", Version: 1 })
                throw new InputException($"{path}: expected format permute-summary, version 1, found {summary?.Format ?? "nothing"}, version {summary?.Version}.");
            return summary;
        }
        catch (JsonException e)
        {
            throw new InputException($"{path} is no summary of ours ({e.Message}): give the summary.json of a run folder.", e);
        }
    }

    /// <summary>Degrees of freedom (a number or a pair) and arrangements (a number or, beyond a double, text).</summary>
    private sealed class NumberPairOrText : JsonConverter<object>
    {
        public override object? Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options) => reader.TokenType switch
        {
            JsonTokenType.Number => reader.GetDouble(),
            JsonTokenType.StartArray => JsonSerializer.Deserialize<double[]>(ref reader, options),
            JsonTokenType.String => reader.GetString() is var text && text == "Infinity" ? double.PositiveInfinity : text,
            _ => throw new JsonException($"a number, a list of numbers or text was expected, found {reader.TokenType}"),
        };

        public override void Write(Utf8JsonWriter writer, object value, JsonSerializerOptions options)
        {
            switch (value)
            {
                case string text:
                    writer.WriteStringValue(text);
                    break;
                case System.Numerics.BigInteger big:
                    writer.WriteStringValue(big.ToString());
                    break;
                case IEnumerable list:
                    writer.WriteStartArray();
                    foreach (object item in list) Write(writer, item, options);
                    writer.WriteEndArray();
                    break;
                default:
                    JsonSerializer.Serialize(writer, Convert.ToDouble(value), options);
                    break;
            }
        }
    }
}
