using FluentValidation;

namespace ResponseLedger.Server.Http;

/// <summary>Runs the FluentValidation validator of a request before its handler: 422 with every problem by field.</summary>
internal static class Validation
{
    /// <summary>Validates the handler's argument of this type. Every route with a body has it.</summary>
    public static RouteHandlerBuilder Validated<TRequest>(this RouteHandlerBuilder route)
        where TRequest : class
        => route.AddEndpointFilter(async (context, next) =>
        {
            var request = context.Arguments.OfType<TRequest>().FirstOrDefault()
                ?? throw new RefusedException(new FieldRefused("", "The request needs a JSON body."));
            var validator = context.HttpContext.RequestServices.GetRequiredService<IValidator<TRequest>>();
            var result = await validator.ValidateAsync(request, context.HttpContext.RequestAborted);
            if (!result.IsValid)
                throw new RefusedException(new FieldRefused(result.Errors
                    .GroupBy(failure => InApiNotation(failure.PropertyName), failure => failure.ErrorMessage)
                    .ToDictionary(group => group.Key, group => group.Distinct().ToArray())));
            return await next(context);
        }).ProducesValidationProblem(StatusCodes.Status422UnprocessableEntity);

    private static string InApiNotation(string path)
        => string.Join('.', path.Split('.').Select(part => part.Length == 0 ? part : char.ToLowerInvariant(part[0]) + part[1..]));
}
