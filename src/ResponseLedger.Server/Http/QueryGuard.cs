using System.Globalization;
using Microsoft.AspNetCore.Http.Metadata;
using ResponseLedger.Records;

namespace ResponseLedger.Server.Http;

/// <summary>
/// Judges the query of every request in one place, before its route: control characters stand in nothing that can be asked for,
/// and a number that cannot be read is told by its name. Runs behind the policies, so that a stranger hears 401 first.
/// </summary>
internal sealed class QueryGuard(RequestDelegate next)
{
    /// <exception cref="RefusedException">422, each parameter named.</exception>
    public Task InvokeAsync(HttpContext context)
    {
        if (context.Request.Query.Count == 0)
            return next(context);

        var errors = new Dictionary<string, string[]>(StringComparer.OrdinalIgnoreCase);
        foreach (var (name, values) in context.Request.Query)
        {
            if (TextRules.HoldsControl(name) || values.Any(value => value is not null && TextRules.HoldsControl(value)))
                errors[name] = ["Control characters cannot stand in a query."];
        }

        foreach (var parameter in context.GetEndpoint()?.Metadata.GetOrderedMetadata<IParameterBindingMetadata>() ?? [])
        {
            if (parameter.HasTryParse
                && context.Request.Query.TryGetValue(parameter.Name, out var values)
                && values.Any(value => !IsReadable(value, parameter.ParameterInfo.ParameterType)))
                errors.TryAdd(InApiNotation(parameter.Name), [Expected(parameter.ParameterInfo.ParameterType)]);
        }

        return errors.Count == 0 ? next(context) : throw new RefusedException(new FieldRefused(errors));
    }

    // The kinds of number that routes ask for; a parameter of another type is its binder's to judge.
    private static bool IsReadable(string? text, Type type) => (Nullable.GetUnderlyingType(type) ?? type) switch
    {
        var whole when whole == typeof(int) => int.TryParse(text, NumberStyles.Integer, CultureInfo.InvariantCulture, out _),
        var whole when whole == typeof(long) => long.TryParse(text, NumberStyles.Integer, CultureInfo.InvariantCulture, out _),
        _ => true,
    };

    private static string Expected(Type type)
    {
        var highest = (Nullable.GetUnderlyingType(type) ?? type) == typeof(int) ? int.MaxValue : long.MaxValue;
        return string.Create(CultureInfo.InvariantCulture, $"Expected a whole number, {highest} at most.");
    }

    private static string InApiNotation(string name) => char.ToLowerInvariant(name[0]) + name[1..];
}
