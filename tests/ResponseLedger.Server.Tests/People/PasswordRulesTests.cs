using ResponseLedger.Server.People;

namespace ResponseLedger.Server.Tests.People;

public sealed class PasswordRulesTests
{
    private readonly PasswordRules rules = new();

    [Theory]
    [InlineData("fourteen chars")]
    [InlineData("")]
    [InlineData(null)]
    public void Under_fifteen_characters_is_too_short(string? password)
        => Assert.Contains("at least 15", rules.Against(password, "ada@example.test", "Ada"), StringComparison.Ordinal);

    [Fact]
    public void Length_is_allowed_from_15_to_128()
    {
        Assert.Null(rules.Against("fifteen letters", "ada@example.test", "Ada"));
        Assert.Null(rules.Against(string.Concat(Enumerable.Range(0, 32).Select(i => $"{i:00}ab")), "ada@example.test", "Ada"));
        Assert.Contains("at most 128", rules.Against(new string('x', 129), "ada@example.test", "Ada"), StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("only lower case letters")]
    [InlineData("ΠΟΛΛΑ ΤΑ ΔΕΙΝΑ ΚΟΥΔΕΝ")]
    [InlineData("operator-password-1")]
    public void No_composition_is_asked_for(string password) => Assert.Null(rules.Against(password, "operator@example.test", "Operator"));

    [Theory]
    [InlineData("passwordpassword")]
    [InlineData("Password Password")]
    [InlineData("correct horse battery staple")]
    [InlineData("qwertyuiopasdfgh")]
    [InlineData("123456789012345")]
    [InlineData("aaaaaaaaaaaaaaaa")]
    [InlineData("abcdabcdabcdabcd")]
    [InlineData("zyxwvutsrqponml")]
    public void What_is_tried_first_is_refused(string password) => Assert.NotNull(rules.Against(password, "ada@example.test", "Ada"));

    [Theory]
    [InlineData("ResponseLedger-2026")]
    [InlineData("ada.lovelace@example.test")]
    [InlineData("Ada Lovelace 1815!")]
    [InlineData("lovelacelovelace1")]
    public void The_name_of_the_product_or_of_the_person_is_no_password(string password)
        => Assert.NotNull(rules.Against(password, "ada.lovelace@example.test", "Ada Lovelace"));
}
