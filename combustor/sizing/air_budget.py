"""Shares of the air, from the equivalence ratios the zones are to have."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.sizing.sketch import RowName

AIR_BUDGET = Method(
    key="air-budget",
    quantity="shares of the air from zone equivalence ratios",
    source="mass balance: primary = swirler + dome + the share of the primary row that turns "
    "upstream; secondary = all jets up to its end and the film air mixed in by then",
    reading="derived",
)
DOME_SHARES = Method(
    key="dome-air-practice",
    quantity="share of the air through swirler and dome",
    source="diffusion front ends: swirler 3 to 12 %, dome cooling about 6 %",
    reading="common practice, no source",
    validity={"swirler_share": (0.03, 0.12)},
)
SECONDARY_SHARE = Method(
    key="secondary-row-share",
    quantity="share of the air for a secondary row",
    source="5 % give six holes that still reach the hot core; below 2 % no row is worth drilling",
    reading="judgement",
)

LEAST_SWIRLER, PREFERRED_SWIRLER, HIGHEST_SWIRLER = 0.03, 0.10, 0.12
PREFERRED_DOME = 0.06
USUAL_SECONDARY, LEAST_SECONDARY = 0.05, 0.02
LEAST_PRIMARY_ROW = 0.04
LEAST_DILUTION = 0.04


@dataclass(frozen=True)
class AirBudget:
    """Shares of all air, by role; they sum to one.

    ``spare`` is what a lean front end had left over for film or dilution; it is in one of them.
    ``film_asked`` is what the wall asks for.
    """

    swirler: float
    dome: float
    primary: float
    secondary: float
    dilution: float
    film: float
    leak: float
    premixer: float = 0.0
    spare: float = 0.0
    film_asked: float = 0.0

    @property
    def front(self) -> float:
        """Swirler, premixer and dome together: what does not pass the annulus."""
        return self.swirler + self.premixer + self.dome

    def of_row(self, name: RowName) -> float:
        """Return the share of a row."""
        return {"primary": self.primary, "secondary": self.secondary, "dilution": self.dilution}[
            name
        ]


@dataclass(frozen=True)
class BudgetDemand:
    """What the budget has to meet.

    Parameters
    ----------
    overall, primary, secondary : float
        Equivalence ratios: of all air, and wanted in the zones [-]
    primary_jet_share : float
        Share of the primary row that turns upstream [-]
    film : float
        All film air [-]
    film_mixed : float
        Film air that counts as mixed at the end of the secondary zone [-]
    leak : float
        [-]
    swirler, dome : float or None
        Stated shares [-]
    """

    overall: float
    primary: float
    secondary: float
    primary_jet_share: float
    film: float
    film_mixed: float
    leak: float
    swirler: float | None = None
    dome: float | None = None


def budget(demand: BudgetDemand) -> AirBudget:
    """Return the shares of the air.

    Swirler and dome take their usual share and the secondary row closes the secondary zone's
    balance. Where that leaves the row less than its usual share, the front end takes over part
    of the primary row's air, and the row makes do with what that still leaves it.

    Parameters
    ----------
    demand : BudgetDemand

    Returns
    -------
    AirBudget

    Raises
    ------
    InfeasibleError
        No split of the air meets both equivalence ratios; the chain of causes says why.
    """
    primary_air = demand.overall / demand.primary
    secondary_air = demand.overall / demand.secondary
    _check_zones(demand, primary_air, secondary_air)
    front, secondary = _front_and_secondary(demand, primary_air, secondary_air)
    primary_row = (primary_air - front) / demand.primary_jet_share
    used = front + primary_row + secondary + demand.film + demand.leak
    dilution = 1.0 - used
    if dilution < LEAST_DILUTION:
        raise InfeasibleError(
            (
                f"an equivalence ratio of {demand.primary:.2f} in the primary and "
                f"{demand.secondary:.2f} in the secondary zone, with {demand.overall:.3f} "
                f"overall, takes {_percent(front + primary_row + secondary)} of the air through "
                "swirler, dome, primary and secondary rows",
                f"with {_percent(demand.film)} film air and {_percent(demand.leak)} leakage "
                f"{_percent(used)} of the air is spoken for",
                f"{_left(dilution)} is left for dilution where {_percent(LEAST_DILUTION)} is "
                "the least that still shapes the exit",
            ),
            "Raise the zone equivalence ratios, raise wall_temperature (less film air), or "
            "lower exit_temperature.",
        )
    swirler, dome = _swirler_and_dome(demand, front)
    return AirBudget(swirler, dome, primary_row, secondary, dilution, demand.film, demand.leak)


def _check_zones(demand: BudgetDemand, primary_air: float, secondary_air: float) -> None:
    for name, wanted, air in (
        ("primary", demand.primary, primary_air),
        ("secondary", demand.secondary, secondary_air),
    ):
        if air > 1.0:
            raise InfeasibleError(
                (
                    f"all the air together makes an equivalence ratio of {demand.overall:.3f}",
                    f"a {name} zone at {wanted:.2f} would need {_percent(air)} of the air",
                    "the air budget is over 100 %",
                ),
                f"Raise equivalence_ratio.{name} above {demand.overall:.2f} or lower "
                "exit_temperature.",
            )
    if secondary_air < primary_air:
        raise InfeasibleError(
            (
                f"the secondary zone is to be richer ({demand.secondary:.2f}) than the primary "
                f"zone ({demand.primary:.2f})",
                "air would have to leave the liner between them",
            ),
            "Set equivalence_ratio.secondary below equivalence_ratio.primary.",
        )


def _front_and_secondary(
    demand: BudgetDemand, primary_air: float, secondary_air: float
) -> tuple[float, float]:
    """Return swirler plus dome, and the secondary row's share."""
    share = demand.primary_jet_share
    usual = _usual_front(demand)
    most = primary_air - share * LEAST_PRIMARY_ROW
    least = _least_front(demand)
    if least > most:
        _refuse_front(demand, least, primary_air)
    front = max(min(usual, most), least)
    rest = secondary_air - demand.film_mixed
    secondary = rest - front - (primary_air - front) / share
    is_free = demand.swirler is None or demand.dome is None
    if secondary < USUAL_SECONDARY and share < 1.0 and is_free:
        needed = (primary_air / share + USUAL_SECONDARY - rest) / (1.0 / share - 1.0)
        # a front end of all the primary air leaves the secondary row what is over
        front = max(front, min(needed, most))
        secondary = rest - front - (primary_air - front) / share
    if secondary < LEAST_SECONDARY - 1e-9:
        raise InfeasibleError(
            (
                f"an equivalence ratio of {demand.primary:.2f} takes {_percent(primary_air)} "
                f"of the air into the primary zone and {demand.secondary:.2f} allows "
                f"{_percent(secondary_air)} by the end of the secondary zone",
                f"of the {_percent(secondary_air - primary_air)} between them the film gives "
                f"{_percent(demand.film_mixed)} and the primary row's downstream part "
                f"{_percent((primary_air - front) * (1.0 / share - 1.0))}",
                f"{_left(secondary)} is left for the secondary row where "
                f"{_percent(LEAST_SECONDARY)} is the least worth drilling",
            ),
            "Lower equivalence_ratio.secondary, raise equivalence_ratio.primary, allow less "
            "film air (a higher wall_temperature), or give swirler and dome more air.",
        )
    return front, secondary


def _refuse_front(demand: BudgetDemand, front: float, primary_air: float) -> None:
    raise InfeasibleError(
        (
            f"swirler and dome are to take at least {_percent(front)} of the air",
            f"an equivalence ratio of {demand.primary:.2f} leaves {_percent(primary_air)} for "
            "the whole primary zone",
            "no air is left for the primary row",
        ),
        "Lower swirler_air or dome_air, lower equivalence_ratio.primary, or raise "
        "exit_temperature.",
    )


def _usual_front(demand: BudgetDemand) -> float:
    swirler = PREFERRED_SWIRLER if demand.swirler is None else demand.swirler
    dome = PREFERRED_DOME if demand.dome is None else demand.dome
    return swirler + dome


def _least_front(demand: BudgetDemand) -> float:
    """Return the least a front end can take: what is stated, and a swirler that swirls."""
    swirler = LEAST_SWIRLER if demand.swirler is None else demand.swirler
    return swirler + (demand.dome or 0.0)


def _swirler_and_dome(demand: BudgetDemand, front: float) -> tuple[float, float]:
    """Return the two shares of a front end; beyond the usual the swirler fills up first."""
    if demand.swirler is not None:
        return demand.swirler, front - demand.swirler
    if demand.dome is not None:
        return front - demand.dome, demand.dome
    usual = PREFERRED_SWIRLER + PREFERRED_DOME
    if front <= usual:
        swirler = max(front * PREFERRED_SWIRLER / usual, LEAST_SWIRLER)
        return swirler, front - swirler
    swirler = min(front - PREFERRED_DOME, HIGHEST_SWIRLER)
    return swirler, front - swirler


def _percent(share: float) -> str:
    return f"{100.0 * share:.1f} %"


def _left(share: float) -> str:
    return _percent(share) if share > 0.0 else "nothing"
