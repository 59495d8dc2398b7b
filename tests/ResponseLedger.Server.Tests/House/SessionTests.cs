using System.Net;

namespace ResponseLedger.Server.Tests.House;

public sealed class SessionTests(Lab lab)
{
    [Fact]
    public async Task The_manager_of_the_settings_signs_in_and_is_told_what_it_holds()
    {
        var manager = await lab.SignInAsync("manager");

        var session = await (await manager.GetAsync("/api/session")).ShouldBeAsync(HttpStatusCode.OK);

        Assert.Equal(Lab.ManagerEmail, session.GetProperty("email").GetString());
        Assert.Equal(["engineer", "manager", "operator", "quality"], session.GetProperty("roles").EnumerateArray().Select(r => r.GetString()));
        Assert.False(session.GetProperty("mustChangePassword").GetBoolean());
    }
}
