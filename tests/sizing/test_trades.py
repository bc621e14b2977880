"""What gave way: targets relaxed one by one, each sized again."""

import pytest

from combustor.sizing import size
from combustor.sizing.trades import STEPS, trades_of


@pytest.fixture(scope="module")
def hot(make_can):
    """So hot an exit on so cold a wall that the film is held back."""
    return make_can(
        ('exit_temperature = "1000 degC"', 'exit_temperature = "1420 degC"'),
        ('casing_length = "1150 mm"', 'casing_length = "1600 mm"'),
        ('wall_temperature = "850 degC"', 'wall_temperature = "700 degC"'),
    )


def test_each_trade_is_what_sizing_again_gives(case, fuel, gas, design):
    trades = trades_of(case, fuel, gas, design)
    assert [trade.target for trade in trades] == [target for target, _, _ in STEPS]
    loss = trades[0]
    targets = case.targets.model_copy(update={"pressure_loss": case.targets.pressure_loss + 0.005})
    again = size(case.model_copy(update={"targets": targets}), fuel, gas)
    assert loss.casing_height == pytest.approx(
        again.hardware.reference_height - design.hardware.reference_height
    )
    assert loss.casing_height < 0.0 and loss.verdict == "buys"


def test_a_broken_limit_is_counted(hot, fuel, gas):
    design = size(hot, fuel, gas)
    broken = sum(finding.level == "act" for finding in design.findings)
    assert broken >= 1
    for trade in trades_of(hot, fuel, gas, design):
        assert trade.verdict in ("binds", "buys", "no gain", "refused")
        assert (trade.verdict == "binds") == (trade.limits_met > 0)
        assert bool(trade.note) == (trade.verdict == "refused")


def test_a_target_that_cannot_be_relaxed_says_why(fuel, gas, make_can):
    """At the rich end of a diffusion front end a step further is none any more."""
    case = make_can(
        ("primary = 0.95", "primary = 1.96"),
        ('casing_length = "1150 mm"', 'casing_length = "1600 mm"'),
    )
    trades = {trade.target: trade for trade in trades_of(case, fuel, gas, size(case, fuel, gas))}
    richer = trades["equivalence_ratio.primary"]
    assert richer.verdict == "refused"
    assert "diffusion front end" in richer.note
