using System.Xml.Linq;

namespace ResponseLedger.House.Tests;

/// <summary>What each room may use: the plan of the house as data. A new arrow or package is a change of this table, with its reason in DEVELOPERS.md.</summary>
internal static class Rooms
{
    public static IReadOnlyDictionary<string, Room> All { get; } = new Dictionary<string, Room>
    {
        ["Engine"] = new([], ["System.Numerics.Tensors", "MathNet.Numerics"]),
        ["Formats"] = new(["Engine"], ["Apache.Arrow"]),
        ["Ledger"] = new([], ["NSec.Cryptography"]),
        ["Records"] = new(["Engine", "Formats", "Ledger"], []),
        ["Store"] = new(["Engine", "Formats", "Ledger", "Records"],
            ["Npgsql", "Npgsql.EntityFrameworkCore.PostgreSQL", "EFCore.NamingConventions",
             "Microsoft.AspNetCore.Identity.EntityFrameworkCore", "Microsoft.AspNetCore.DataProtection.EntityFrameworkCore"]),
        ["Migrations"] = new(["Store"], ["Microsoft.EntityFrameworkCore.Design"]),
        ["Server"] = new(["Engine", "Formats", "Ledger", "Records", "Store", "Migrations"],
            ["FluentValidation", "Microsoft.AspNetCore.OpenApi"]),
        ["Bench"] = new(["Engine", "Formats", "Ledger", "Records"], ["System.CommandLine"]),
    };

    public static string ProjectFile(string room)
        => Path.Combine(Tree.Root, room == "Migrations" ? "migrations" : "src", $"ResponseLedger.{room}", $"ResponseLedger.{room}.csproj");

    public static IReadOnlyList<string> Arrows(string room)
        => [.. Items(room, "ProjectReference").Select(path => Path.GetFileNameWithoutExtension(path.Replace('\\', '/')).Replace("ResponseLedger.", "", StringComparison.Ordinal))];

    public static IReadOnlyList<string> Packages(string room) => [.. Items(room, "PackageReference")];

    private static IEnumerable<string> Items(string room, string kind)
        => XDocument.Load(ProjectFile(room)).Descendants(kind).Select(item => item.Attribute("Include")!.Value);
}

internal sealed record Room(IReadOnlyList<string> MayUse, IReadOnlyList<string> MayInstall);
