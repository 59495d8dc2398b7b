using System.Reflection.Metadata;
using System.Reflection.PortableExecutable;

namespace ResponseLedger.House.Tests;

public sealed class Each_room_keeps_to_its_row
{
    public static TheoryData<string> RoomNames => [.. Rooms.All.Keys];

    [Theory]
    [MemberData(nameof(RoomNames))]
    public void A_room_refers_only_to_the_rooms_of_its_row(string room)
        => Assert.Empty(Rooms.Arrows(room).Except(Rooms.All[room].MayUse));

    [Theory]
    [MemberData(nameof(RoomNames))]
    public void A_room_installs_only_the_packages_of_its_row(string room)
        => Assert.Empty(Rooms.Packages(room).Except(Rooms.All[room].MayInstall));

    [Theory]
    [MemberData(nameof(RoomNames))]
    public void A_built_room_uses_no_other_room_by_a_back_door(string room)
    {
        // A reference that comes along with another room is in reach of the compiler; the metadata tell whether it is used.
        var rooms = Rooms.All.Keys.Select(name => $"ResponseLedger.{name}").ToHashSet();
        var used = AssembliesUsedBy(room).Where(rooms.Contains).Select(name => name["ResponseLedger.".Length..]);
        Assert.Empty(used.Except(Rooms.All[room].MayUse));
    }

    [Fact]
    public void Every_project_under_src_has_a_row()
        => Assert.Equal(
            Rooms.All.Keys.Order(StringComparer.Ordinal),
            Tree.SourceFiles("src", "*.csproj").Concat(Tree.SourceFiles("migrations", "*.csproj"))
                .Select(file => Path.GetFileNameWithoutExtension(file)["ResponseLedger.".Length..]).Order(StringComparer.Ordinal));

    [Fact]
    public void Arrows_make_no_circle()
    {
        foreach (var room in Rooms.All.Keys)
            Assert.DoesNotContain(room, Reached(room, []));
    }

    [Theory]
    [InlineData("Engine")]
    [InlineData("Ledger")]
    [InlineData("Records")]
    public void A_pure_room_knows_no_file_clock_network_or_database(string room)
    {
        string[] forbidden =
        [
            "System.IO.File", "System.IO.FileStream", "System.IO.Directory", "System.IO.StreamReader", "System.IO.StreamWriter",
            "System.TimeProvider", "System.Environment", "System.Diagnostics.Process", "System.Console",
        ];
        Assert.Empty(TypesUsedBy(room).Where(type => forbidden.Contains(type)
            || type.StartsWith("System.Net.", StringComparison.Ordinal)
            || type.StartsWith("System.Data.", StringComparison.Ordinal)
            || (room == "Engine" && type.StartsWith("System.Text.Json.", StringComparison.Ordinal))).ToList());
    }

    private static HashSet<string> Reached(string room, HashSet<string> seen)
    {
        foreach (var next in Rooms.All[room].MayUse)
        {
            if (seen.Add(next))
                Reached(next, seen);
        }

        return seen;
    }

    private static List<string> AssembliesUsedBy(string room)
        => Read(room, metadata => metadata.AssemblyReferences.Select(handle => metadata.GetString(metadata.GetAssemblyReference(handle).Name)).ToList());

    private static List<string> TypesUsedBy(string room)
        => Read(room, metadata => metadata.TypeReferences.Select(metadata.GetTypeReference)
            .Select(type => $"{metadata.GetString(type.Namespace)}.{metadata.GetString(type.Name)}").ToList());

    private static T Read<T>(string room, Func<MetadataReader, T> read)
    {
        using var file = File.OpenRead(Path.Combine(AppContext.BaseDirectory, $"ResponseLedger.{room}.dll"));
        using var image = new PEReader(file);
        return read(image.GetMetadataReader());
    }
}
