"""Film air that gives way where the air budget cannot carry what the wall asks for."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.sizing.air_budget import AirBudget, BudgetDemand

FILM_HELD_BACK = Method(
    key="film-held-back",
    quantity="film air where flame, film and dilution ask for more than all the air",
    source="the flame keeps its equivalence ratio, the film gives way to no less than a "
    "tenth of what the wall asks for; below that the targets are refused",
    reading="judgement",
)

LEAST_FILM_SHARE = 0.1
_HALVINGS = 20


def with_less_film(demand: BudgetDemand, make: Callable[[BudgetDemand], AirBudget]) -> AirBudget:
    """Return a budget, with less film air than demanded where that alone makes one.

    Parameters
    ----------
    demand : BudgetDemand
    make : callable
        Budget for a demand; raises InfeasibleError where there is none.

    Returns
    -------
    AirBudget
        Its ``film_asked`` is the demand's film; ``film`` is what it gets.

    Raises
    ------
    InfeasibleError
        That of the whole demand, where a tenth of the film is still too much.
    """
    try:
        return replace(make(demand), film_asked=demand.film)
    except InfeasibleError as refusal:
        best = _try(demand, LEAST_FILM_SHARE, make)
        if best is None:
            raise refusal from None
    low, high = LEAST_FILM_SHARE, 1.0
    for _ in range(_HALVINGS):
        middle = 0.5 * (low + high)
        found = _try(demand, middle, make)
        if found is None:
            high = middle
        else:
            low, best = middle, found
    return replace(best, film_asked=demand.film)


def _try(
    demand: BudgetDemand, share: float, make: Callable[[BudgetDemand], AirBudget]
) -> AirBudget | None:
    less = replace(demand, film=share * demand.film, film_mixed=share * demand.film_mixed)
    try:
        return make(less)
    except InfeasibleError:
        return None
