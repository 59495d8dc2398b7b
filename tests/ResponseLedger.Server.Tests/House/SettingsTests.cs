using Microsoft.Extensions.Configuration;
using Npgsql;
using ResponseLedger.Server.Start;

namespace ResponseLedger.Server.Tests.House;

public sealed class SettingsTests
{
    private const string Connection = "Host=db.example.test;Username=lab;Database=";

    [Fact]
    public void Without_a_connection_string_the_embedded_store_runs_the_demo_lab()
    {
        var settings = Read();

        Assert.Null(settings.ConnectionString);
        Assert.True(settings.Demo);
    }

    [Fact]
    public void With_a_connection_string_the_demo_lab_is_off_and_the_database_the_one_named()
    {
        var settings = Read(("ConnectionStrings:Ledger", Connection + "ledger"));

        Assert.False(settings.Demo);
        Assert.Equal("ledger", new NpgsqlConnectionStringBuilder(settings.ConnectionString).Database);
    }

    [Theory]
    [InlineData("ledger", "demo")]
    [InlineData("lab7", "lab7_demo")]
    [InlineData("demo", "demo")]
    public void The_demo_lab_never_runs_in_the_database_of_a_real_ledger(string named, string used)
        => Assert.Equal(used, new NpgsqlConnectionStringBuilder(Read(("ConnectionStrings:Ledger", Connection + named), ("RESPONSELEDGER_DEMO", "1")).ConnectionString).Database);

    [Theory]
    [InlineData("RESPONSELEDGER_DEMO", "yes")]
    [InlineData("RESPONSELEDGER_ADMIN_PASSWORD", "a password and no e-mail")]
    [InlineData("ConnectionStrings:LedgerOwner", "Host=db.example.test")]
    public void A_setting_that_cannot_stand_is_named(string key, string value)
    {
        var failure = Assert.Throws<StartFailure>(() => Read((key, value)));

        Assert.Contains(key.Replace(":", "__", StringComparison.Ordinal), failure.Message, StringComparison.Ordinal);
    }

    private static StartSettings Read(params (string Key, string? Value)[] values)
        => StartSettings.From(new ConfigurationBuilder().AddInMemoryCollection(values.Select(v => KeyValuePair.Create(v.Key, v.Value))).Build());
}
