using Microsoft.Net.Http.Headers;
using ResponseLedger.Server.Http;
using ResponseLedger.Store;
using ResponseLedger.Store.Queries;

namespace ResponseLedger.Server.Lots;

/// <summary>Answers the overlay of a lot.</summary>
internal static class ReadOverlay
{
    public static async Task<OverlayAnswer> GetAsync(
        Guid id,
        ResponseLedgerContext db,
        CancellationToken cancellationToken,
        string? quantity = null,
        string? basis = null,
        int? points = null,
        string? condition = null)
    {
        var question = OverlayQuestion.Parse(quantity, basis, points, condition);
        var curves = await LotCurves.ReadAsync(db, id, question.Condition, cancellationToken);
        if (curves is null)
        {
            await ReadLots.FindAsync(db, id, cancellationToken);
            throw new RefusedException(new FieldRefused("condition", "The lot's device has no such condition."));
        }

        return question.MinusGolden && curves.Golden is null
            ? throw new RefusedException(new NoGoldenRun(curves.Condition.Name))
            : new OverlayAnswer(Overlay.Of(curves, question));
    }
}

/// <summary>An overlay as JSON, or as an Arrow stream where the request asks for one.</summary>
internal sealed class OverlayAnswer(Overlay overlay) : IResult
{
    public async Task ExecuteAsync(HttpContext httpContext)
    {
        var (request, response) = (httpContext.Request, httpContext.Response);
        response.Headers.Vary = HeaderNames.Accept;
        if (request.GetTypedHeaders().Accept.Any(a => a.MediaType.Equals(OverlayArrow.MediaType, StringComparison.OrdinalIgnoreCase) && a.Quality is not 0))
        {
            // The writer works on a stream without waiting, which the server does not allow on the response itself.
            using var whole = new MemoryStream();
            OverlayArrow.Write(whole, overlay);
            response.ContentType = OverlayArrow.MediaType;
            response.ContentLength = whole.Length;
            whole.Position = 0;
            await whole.CopyToAsync(response.Body, httpContext.RequestAborted);
            return;
        }

        response.ContentType = "application/json; charset=utf-8";
        OverlayJson.Write(response.BodyWriter, overlay);
        await response.BodyWriter.FlushAsync(httpContext.RequestAborted);
    }
}
