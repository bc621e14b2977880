"""Air budget: it balances, and says why it cannot."""

from dataclasses import astuple, replace

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from combustor.base.errors import InfeasibleError
from combustor.sizing.air_budget import (
    LEAST_DILUTION,
    LEAST_SECONDARY,
    BudgetDemand,
    budget,
)

DEMAND = BudgetDemand(
    overall=0.286,
    primary=0.95,
    secondary=0.60,
    primary_jet_share=0.5,
    film=0.27,
    film_mixed=0.06,
    leak=0.02,
)

DEMANDS = st.builds(
    BudgetDemand,
    overall=st.floats(0.15, 0.45),
    primary=st.floats(0.6, 1.7),
    secondary=st.floats(0.35, 0.9),
    primary_jet_share=st.floats(0.3, 1.0),
    film=st.floats(0.0, 0.4),
    film_mixed=st.floats(0.0, 0.12),
    leak=st.floats(0.0, 0.04),
    swirler=st.one_of(st.none(), st.floats(0.04, 0.15)),
    dome=st.one_of(st.none(), st.floats(0.02, 0.15)),
)


@settings(derandomize=True, max_examples=150)
@given(demand=DEMANDS)
def test_budget_balances_and_meets_both_zones(demand):
    try:
        shares = budget(demand)
    except InfeasibleError:
        assume(False)
    assert sum(astuple(shares)) == pytest.approx(1.0, abs=1e-12)
    assert min(astuple(shares)) >= 0.0
    turned = demand.primary_jet_share * shares.primary
    primary = shares.swirler + shares.dome + turned
    assert demand.overall / primary == pytest.approx(demand.primary)
    secondary = shares.front + shares.primary + shares.secondary + demand.film_mixed
    assert demand.overall / secondary == pytest.approx(demand.secondary)
    assert shares.secondary >= LEAST_SECONDARY - 1e-9
    assert shares.dilution >= LEAST_DILUTION - 1e-9


def test_stated_shares_are_kept():
    shares = budget(replace(DEMAND, swirler=0.15))
    assert shares.swirler == pytest.approx(0.15)
    shares = budget(replace(DEMAND, dome=0.12))
    assert shares.dome == pytest.approx(0.12)


def test_richer_primary_takes_less_air_there():
    lean, rich = budget(DEMAND), budget(replace(DEMAND, primary=1.3))
    assert rich.front + 0.5 * rich.primary < lean.front + 0.5 * lean.primary


@pytest.mark.parametrize(
    ("change", "said"),
    [
        ({"overall": 0.8, "primary": 0.7, "secondary": 0.65}, "over 100 %"),
        ({"secondary": 0.99}, "richer"),
        ({"film": 0.75}, "spoken for"),
        ({"film_mixed": 0.17}, "least worth drilling"),
        ({"swirler": 0.2, "dome": 0.2}, "no air is left for the primary row"),
    ],
)
def test_impossible_budgets_explain_the_chain(change, said):
    with pytest.raises(InfeasibleError) as caught:
        budget(replace(DEMAND, **change))
    assert len(caught.value.chain) >= 2
    assert said in str(caught.value)
    assert caught.value.advice
