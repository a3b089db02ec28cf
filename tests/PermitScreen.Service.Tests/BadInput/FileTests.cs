using PermitScreen.Mechanics.Faults;
using PermitScreen.Service.Files;

namespace PermitScreen.Service.Tests.BadInput;

/// <summary>Files in the JSON form of the contract: what is not understood is refused, with the place and the nearest known name (design, section 9).</summary>
public sealed class FileTests
{
    private static readonly string Sound = File.ReadAllText(Repository.Path("deploy", "demo", "applications", "01-reactor-vessel-13-axles.json"));

    [Fact]
    public void A_sound_file_is_read() => Assert.Empty(Faults(Sound));

    [Fact]
    public void An_unknown_field_is_refused_with_the_nearest_known_name()
    {
        var fault = Assert.Single(Faults(Sound.Replace("\"permitKind\"", "\"permitKnd\"", StringComparison.Ordinal)));
        Assert.Equal("application.permitKnd", fault.Path);
        Assert.Contains("did you mean \"permitKind\"", fault.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Every_unknown_field_is_told_at_once()
    {
        var text = Sound.Replace("\"loadKn\"", "\"loadKN\"", StringComparison.Ordinal);
        var faults = Faults(text);
        Assert.Equal(13, faults.Count);
        Assert.Equal("application.configurations[0].loading.axle_trains[0].axles[12].loadKN", faults[^1].Path);
        Assert.All(faults, f => Assert.Contains("\"loadKn\"", f.Message, StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("\"PERMIT_KIND_SPECIAL_SINGLE_TRIP\"", "\"PERMIT_KIND_SPECIAL_SINGLE_TRP\"", "application.permit_kind", "PERMIT_KIND_SPECIAL_SINGLE_TRIP")]
    [InlineData("\"PERMIT_KIND_SPECIAL_SINGLE_TRIP\"", "2", "application.permit_kind", "PERMIT_KIND_ROUTINE")]
    [InlineData("\"CROSSING_RELATION_ON\"", "\"OVER\"", "application.route.crossing_list.crossings[0].relation", "CROSSING_RELATION_ON")]
    public void A_wrong_word_of_an_enumeration_is_refused_with_what_is_allowed(string from, string to, string field, string named)
    {
        var faults = Faults(Sound.Replace(from, to, StringComparison.Ordinal));
        var fault = Assert.Single(faults, f => f.Path == field);
        Assert.Contains(named, fault.Message, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("\"NaN\"")]
    [InlineData("\"Infinity\"")]
    [InlineData("\"-Infinity\"")]
    [InlineData("\"4.45\"")]
    [InlineData("1e999")]
    [InlineData("true")]
    [InlineData("[]")]
    [InlineData("NaN")]
    [InlineData("Infinity")]
    [InlineData("0x10")]
    [InlineData("4,45")]
    public void What_is_no_finite_number_is_refused(string value) =>
        Assert.NotEmpty(Faults(System.Text.RegularExpressions.Regex.Replace(Sound, "\"overallHeightM\": [0-9.]+", $"\"overallHeightM\": {value}", System.Text.RegularExpressions.RegexOptions.None, TimeSpan.FromSeconds(1))));

    [Theory]
    [InlineData("{}")]
    [InlineData("x")]
    [InlineData("]")]
    [InlineData("{\"schema\":\"permitscreen/application/1\"}")]
    public void What_follows_the_end_is_refused(string tail) => Assert.NotEmpty(Faults(Sound + tail));

    [Fact]
    public void A_field_that_stands_twice_is_refused()
    {
        var fault = Assert.Single(Faults(Sound.Replace("\"permitKind\":", "\"permitKind\": \"PERMIT_KIND_ROUTINE\", \"permitKind\":", StringComparison.Ordinal)));
        Assert.Equal("application.permit_kind", fault.Path);
        Assert.Contains("twice", fault.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Both_spellings_of_a_field_are_one_field() =>
        Assert.Contains(Faults(Sound.Replace("\"permitKind\":", "\"permit_kind\": \"PERMIT_KIND_ROUTINE\", \"permitKind\":", StringComparison.Ordinal)), f => f.Message.Contains("twice", StringComparison.Ordinal));

    [Theory]
    [InlineData("\"permitscreen/application/1\"", "\"permitscreen/application/2\"")]
    [InlineData("\"permitscreen/application/1\"", "\"permitscreen/catalogue/1\"")]
    [InlineData("\"permitscreen/application/1\"", "\"\"")]
    public void A_file_of_another_schema_is_refused(string from, string to) =>
        Assert.Equal("schema", Assert.Single(Faults(Sound.Replace(from, to, StringComparison.Ordinal))).Path);

    [Theory]
    [InlineData("")]
    [InlineData("null")]
    [InlineData("[]")]
    [InlineData("7")]
    [InlineData("{")]
    [InlineData("{\"schema\": \"permitscreen/application/1\", // words\n}")]
    [InlineData("{\"schema\": \"permitscreen/application/1\",}")]
    public void What_is_no_object_of_JSON_is_refused(string text) => Assert.NotEmpty(Faults(text));

    [Fact]
    public void A_text_nested_without_end_is_refused() => Assert.NotEmpty(Faults(string.Concat(Enumerable.Repeat("{\"application\":", 5_000))));

    private static IReadOnlyList<Fault> Faults(string text)
    {
        var faults = new FaultList();
        var file = FileSchemas.ReadApplication(text, faults);
        Assert.Equal(faults.Any, file is null);
        return faults.All;
    }
}
