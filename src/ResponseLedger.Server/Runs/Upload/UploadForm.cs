using System.Buffers;
using System.Text;
using Microsoft.AspNetCore.WebUtilities;
using Microsoft.Net.Http.Headers;
using ResponseLedger.Server.Http;

namespace ResponseLedger.Server.Runs.Upload;

/// <summary>A multipart request as it came: its fields, and its files set aside, so that both may stand in any order.</summary>
internal sealed class UploadForm : IAsyncDisposable
{
    public const long LargestRequestBytes = 256L << 20;

    private const int MostFiles = 1_000;
    private const int MostFields = 64;
    private const int LongestField = 64 << 10;
    private const int LongestBoundary = 200;
    private const int ReadBytes = 64 << 10;

    private readonly Dictionary<string, string> fields = new(StringComparer.Ordinal);
    private readonly List<SpooledFile> files = [];
    private readonly Dictionary<string, string[]> errors = new(StringComparer.Ordinal);
    private long requestBytes;

    public IReadOnlyDictionary<string, string> Fields => fields;

    public IReadOnlyList<SpooledFile> Files => files;

    /// <summary>Reads the whole request.</summary>
    /// <param name="request">The request.</param>
    /// <param name="known">The names of its fields, <c>file</c> aside.</param>
    /// <param name="cancellationToken">Stops the reading.</param>
    /// <exception cref="RefusedException">It is no multipart form, a field is unknown or repeated, or there is no file.</exception>
    public static async Task<UploadForm> ReadAsync(HttpRequest request, IReadOnlyCollection<string> known, CancellationToken cancellationToken)
    {
        var reader = new MultipartReader(BoundaryOf(request), request.Body, ReadBytes);
        var form = new UploadForm();
        try
        {
            await form.ReadAsync(reader, known, cancellationToken);
            if (form.files.Count == 0)
                form.errors.TryAdd("file", ["Send at least one sweep file in a part named file."]);
            if (form.errors.Count > 0)
                throw new RefusedException(new FieldRefused(form.errors));
            return form;
        }
        catch (Exception exception)
        {
            await form.DisposeAsync();
            if (exception is InvalidDataException || (exception is IOException && exception is not BadHttpRequestException))
                throw new BadHttpRequestException("The multipart body is cut short or malformed.", exception);
            throw;
        }
    }

    public async ValueTask DisposeAsync()
    {
        foreach (var file in files)
            await file.DisposeAsync();
    }

    private async Task ReadAsync(MultipartReader reader, IReadOnlyCollection<string> known, CancellationToken cancellationToken)
    {
        while (await reader.ReadNextSectionAsync(cancellationToken) is { } section)
        {
            if (!ContentDispositionHeaderValue.TryParse(section.ContentDisposition, out var disposition))
                throw new InvalidDataException("A part has no content disposition.");
            var name = HeaderUtilities.RemoveQuotes(disposition.Name).ToString();
            if (name == "file")
            {
                if (files.Count == MostFiles)
                    throw new RefusedException(new FieldRefused("file", $"One request takes {MostFiles} files at most. Send the others in a further one."));
                files.Add(await SpooledFile.KeepAsync(PartFileName.Of(disposition), section.Body, Count, cancellationToken));
                continue;
            }

            await ReadFieldAsync(name, section.Body, known, cancellationToken);
        }
    }

    private async Task ReadFieldAsync(string name, Stream body, IReadOnlyCollection<string> known, CancellationToken cancellationToken)
    {
        if (fields.Count + errors.Count >= MostFields)
            throw new RefusedException(new FieldRefused("", $"One request takes {MostFields} fields at most."));
        var bytes = ArrayPool<byte>.Shared.Rent(LongestField + 1);
        try
        {
            var length = await body.ReadAtLeastAsync(bytes.AsMemory(0, LongestField + 1), LongestField + 1, throwOnEndOfStream: false, cancellationToken);
            Count(length);
            Keep(name, bytes.AsSpan(0, length), known);
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(bytes);
        }
    }

    private void Keep(string name, ReadOnlySpan<byte> value, IReadOnlyCollection<string> known)
    {
        if (!known.Contains(name))
            errors[name] = [$"There is no field of this name here. Known are {string.Join(", ", known)} and file."];
        else if (value.Length > LongestField)
            errors[name] = [$"A field holds {LongestField} bytes at most."];
        else if (!fields.TryAdd(name, Encoding.UTF8.GetString(value).Trim()))
            errors[name] = ["This field is given more than once."];
    }

    private void Count(int bytes)
    {
        requestBytes += bytes;
        if (requestBytes > LargestRequestBytes)
            throw new BadHttpRequestException("The request is too large.", StatusCodes.Status413PayloadTooLarge);
    }

    private static string BoundaryOf(HttpRequest request)
    {
        if (MediaTypeHeaderValue.TryParse(request.ContentType, out var type)
            && type.MediaType.Equals("multipart/form-data", StringComparison.OrdinalIgnoreCase)
            && HeaderUtilities.RemoveQuotes(type.Boundary) is { Length: > 0 and <= LongestBoundary } boundary)
            return boundary.ToString();
        throw new RefusedException(new NotMultipart());
    }
}
