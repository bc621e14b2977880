"""Rich-lean and lean-premixed front ends: their rows, their air, their practice."""

from __future__ import annotations

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.sizing.air_budget import (
    LEAST_DILUTION,
    LEAST_SWIRLER,
    PREFERRED_DOME,
    AirBudget,
    BudgetDemand,
)
from combustor.sizing.sketch import RowName

RICH_LEAN_PRACTICE = Method(
    key="rich-lean-practice",
    quantity="equivalence ratios of a rich-quench-lean front end",
    source="rich zone 1.4 to 2, quenched by one row to 0.4 to 0.6",
    reading="from memory",
    validity={"rich": (1.2, 2.0), "lean": (0.35, 0.7)},
)
LEAN_PRACTICE = Method(
    key="lean-premixed-practice",
    quantity="equivalence ratio and air of a lean premixed front end",
    source="0.45 to 0.60 in the flame, 40 to 70 % of the air through it; pilot with a tenth of "
    "the fuel at about 0.8",
    reading="from memory",
    validity={"lean": (0.40, 0.70), "front_share": (0.40, 0.80)},
)
PREMIXER_PRACTICE = Method(
    key="premixer-practice",
    quantity="velocity and residence time in the premixing passage",
    source="30 m/s at least against flashback along the walls, 40 to 100 usual; about a "
    "millisecond to mix, below a tenth of the delay of autoignition",
    reading="common practice, no source",
    validity={"premixer_velocity": (40.0, 110.0), "residence_time": (0.3e-3, 2.0e-3)},
)

DIFFUSION_ROWS: tuple[RowName, ...] = ("primary", "secondary", "dilution")
PILOT_EQUIVALENCE_RATIO = 0.8
LEAST_PREMIXER = 0.15
PREMIXER_VELOCITY_SHARE = 0.6
_NEARLY = 1e-9


def row_names(front_end: str, has_dilution: bool = True) -> tuple[RowName, ...]:
    """Return the rows a front end has; the quench row is its secondary row."""
    if front_end == "diffusion":
        return DIFFUSION_ROWS
    if front_end == "rich-lean":
        return ("secondary", "dilution")
    return ("dilution",) if has_dilution else ()


def rich_budget(demand: BudgetDemand) -> AirBudget:
    """Return the shares of the air: swirler and dome make the rich zone, one row quenches it.

    Raises
    ------
    InfeasibleError
        No split meets both equivalence ratios.
    """
    front = demand.overall / demand.primary
    dome = demand.dome
    if dome is None and demand.swirler is not None:
        dome = front - demand.swirler
    elif dome is None:
        dome = min(PREFERRED_DOME, 0.4 * front)
    swirler = front - dome
    if swirler < LEAST_SWIRLER or dome < -_NEARLY:
        raise InfeasibleError(
            (
                f"an equivalence ratio of {demand.primary:.2f} with {demand.overall:.3f} overall "
                f"leaves {100 * front:.1f} % of the air for the rich zone",
                f"{100 * dome:.1f} % of it cools the dome",
                f"the swirler gets {100 * max(swirler, 0.0):.1f} % where "
                f"{100 * LEAST_SWIRLER:.0f} % is the least that swirls",
            ),
            "Lower equivalence_ratio.primary, lower dome_air or swirler_air, or raise "
            "exit_temperature.",
        )
    quench = demand.overall / demand.secondary - front - demand.film_mixed
    dilution = 1.0 - front - quench - demand.film - demand.leak
    if dilution < LEAST_DILUTION or quench < LEAST_DILUTION:
        raise InfeasibleError(
            (
                f"rich at {demand.primary:.2f} and lean at {demand.secondary:.2f} take "
                f"{100 * front:.1f} % and {100 * max(quench, 0.0):.1f} % of the air",
                f"film takes {100 * demand.film:.1f} % and leakage {100 * demand.leak:.1f} %",
                f"{100 * max(dilution, 0.0):.1f} % is left for dilution where "
                f"{100 * LEAST_DILUTION:.0f} % is the least that still shapes the exit",
            ),
            "Raise equivalence_ratio.secondary, raise wall_temperature (less film air), or lower "
            "exit_temperature.",
        )
    return AirBudget(swirler, dome, 0.0, quench, dilution, demand.film, demand.leak)


def lean_budget(demand: BudgetDemand, pilot_fuel: float, has_row: bool) -> AirBudget:
    """Return the shares of the air: premixer, pilot and dome make the flame.

    What film and leakage leave over goes through a dilution row where there is one, else to
    the film.

    Parameters
    ----------
    demand : BudgetDemand
        Its secondary equivalence ratio is not read.
    pilot_fuel : float
        Share of the fuel through the pilot [-]
    has_row : bool
        Whether there is a dilution row.

    Raises
    ------
    InfeasibleError
        The flame takes more than film and leakage leave.
    """
    front = demand.overall / demand.primary
    swirler = demand.swirler
    if swirler is None:
        swirler = max(pilot_fuel * demand.overall / PILOT_EQUIVALENCE_RATIO, LEAST_SWIRLER)
    dome = PREFERRED_DOME if demand.dome is None else demand.dome
    premixer = front - swirler - dome
    spare = 1.0 - front - demand.film - demand.leak
    if premixer < LEAST_PREMIXER or spare < 0.0:
        raise InfeasibleError(
            (
                f"a flame at an equivalence ratio of {demand.primary:.2f} with "
                f"{demand.overall:.3f} overall takes {100 * front:.1f} % of the air",
                f"pilot and dome take {100 * (swirler + dome):.1f} %, film "
                f"{100 * demand.film:.1f} % and leakage {100 * demand.leak:.1f} %",
                f"{100 * max(premixer, 0.0):.1f} % is left for the premixer"
                if spare >= 0.0
                else f"{100 * -spare:.1f} % more than all the air is spoken for",
            ),
            "Raise equivalence_ratio.primary or wall_temperature (less film air)."
            if spare < 0.0
            else "Lower equivalence_ratio.primary, swirler_air or dome_air.",
        )
    return AirBudget(
        swirler=swirler,
        dome=dome,
        primary=0.0,
        secondary=0.0,
        dilution=max(spare, 0.5 * LEAST_DILUTION) if has_row else 0.0,
        film=demand.film - max(0.5 * LEAST_DILUTION - spare, 0.0)
        if has_row
        else demand.film + spare,
        leak=demand.leak,
        premixer=premixer,
        spare=spare,
    )
