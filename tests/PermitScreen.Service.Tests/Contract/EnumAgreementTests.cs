using PermitScreen.Service.Mapping;
using C = PermitScreen.Contracts.V1;

namespace PermitScreen.Service.Tests.Contract;

/// <summary>Enumerations of the contract and of the domain. Some are cast by number: names and numbers must agree, both ways.</summary>
public sealed class EnumAgreementTests
{
    [Fact]
    public void Reason_codes_agree_by_name_and_number() => Agree<Rating.Checks.ReasonCode, C.ReasonCode>();

    [Fact]
    public void Kinds_of_member_agree_by_name_and_number() => Agree<Rating.Structures.SystemKind, C.SystemKind>();

    [Fact]
    public void Every_kind_of_member_is_read() =>
        Assert.All(Said<C.SystemKind>(), k => Assert.Equal(k.ToString(), k.ToDomain()?.ToString()));

    [Fact]
    public void A_number_that_the_contract_does_not_know_is_not_read()
    {
        Assert.Null(((C.SystemKind)99).ToDomain());
        Assert.Null(((C.RatingMethod)99).ToDomain());
        Assert.Null(((C.LimitState)99).ToDomain());
        Assert.Null(((C.RatingLevel)99).ToDomain());
        Assert.Null(((C.EffectSense)99).ToDomain());
        Assert.Null(((C.DeadLoadComponent)99).ToDomain());
    }

    [Fact]
    public void Nothing_said_is_not_read()
    {
        Assert.Null(C.SystemKind.Unspecified.ToDomain());
        Assert.Null(C.RatingMethod.Unspecified.ToDomain());
        Assert.Null(C.LimitState.Unspecified.ToDomain());
        Assert.Null(C.RatingLevel.Unspecified.ToDomain());
        Assert.Null(C.EffectSense.Unspecified.ToDomain());
        Assert.Null(C.DeadLoadComponent.Unspecified.ToDomain());
    }

    [Fact]
    public void Senses_and_components_come_back_as_they_went()
    {
        Assert.All(Enum.GetValues<Rating.Structures.EffectSense>(), s =>
        {
            Assert.Equal(s.ToString(), s.ToContract().ToString());
            Assert.Equal(s, s.ToContract().ToDomain());
        });
        Assert.All(Enum.GetValues<Rating.Structures.DeadLoadComponent>(), c =>
        {
            Assert.Equal(c.ToString(), c.ToContract().ToString());
            Assert.Equal(c, c.ToContract().ToDomain());
        });
    }

    [Fact]
    public void Methods_limit_states_and_levels_are_read_by_name()
    {
        Assert.All(Said<C.RatingMethod>(), m => Assert.Equal(m.ToString(), m.ToDomain()?.ToString()));
        Assert.All(Said<C.LimitState>(), s => Assert.Equal(s.ToString(), s.ToDomain()?.ToString()));
        Assert.All(Said<C.RatingLevel>(), l => Assert.Equal(l.ToString(), l.ToDomain()?.ToString()));
    }

    private static IEnumerable<T> Said<T>()
        where T : struct, Enum =>
        Enum.GetValues<T>().Where(v => v.ToString() != "Unspecified");

    private static void Agree<TDomain, TContract>()
        where TDomain : struct, Enum
        where TContract : struct, Enum
    {
        var domain = Enum.GetValues<TDomain>().Select(v => (v.ToString(), Convert.ToInt32(v, System.Globalization.CultureInfo.InvariantCulture)));
        var contract = Said<TContract>().Select(v => (v.ToString(), Convert.ToInt32(v, System.Globalization.CultureInfo.InvariantCulture)));
        Assert.Equal(contract.Order(), domain.Order());
    }
}
