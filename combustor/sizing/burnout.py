"""How long a lean flame needs until its carbon monoxide is down."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from combustor.base.errors import InfeasibleError
from combustor.base.method import Method
from combustor.case.schema import Case
from combustor.emissions.profile import dry_15_along
from combustor.fuel.gas import Gas
from combustor.fuel.liquids import supplied_enthalpy
from combustor.fuel.record import Fuel
from combustor.kinetics.chain import Cell, burn
from combustor.kinetics.primary import PrimaryZone
from combustor.kinetics.streams import Stream
from combustor.sizing.fire import Supply

BURNOUT = Method(
    key="carbon-monoxide-burn-out",
    quantity="length behind the flame until CO is down to its target",
    source="stirred flame of 2 ms followed by plug flow at the flame's equivalence ratio, "
    "detailed kinetics",
    reading="computed",
    note="no film mixes in; rating adds the cold air",
)

USUAL_CO = 25e-6
FLAME_TIME = 2e-3
NEARLY_DOWN = 1.15
_FIRST_STEP, _GROWTH, _CELLS = 0.1e-3, 1.18, 34


@dataclass(frozen=True)
class Burnout:
    """Time and gas behind a lean flame.

    Parameters
    ----------
    time : float
        From the flame's end until CO is down [s]
    density : float
        Of the gas there [kg/m3]
    wanted : float
        CO asked for, dry at 15 % O2 [-]
    at_flame : float
        CO at the flame's end, likewise [-]
    reached : float
        CO after that time; above ``wanted`` where equilibrium holds more [-]
    """

    time: float
    density: float
    wanted: float
    at_flame: float
    reached: float


def burnout_of(
    case: Case, fuel: Fuel, gas: Gas, supply: Supply, fuel_flow: float, equivalence_ratio: float
) -> Burnout:
    """Return the burn-out at the design point.

    Raises
    ------
    InfeasibleError
        No flame at this equivalence ratio.
    """
    wanted = case.targets.emissions.co or USUAL_CO
    stoichiometric = fuel.stoichiometric_fuel_air_ratio
    dry = fuel_flow / (stoichiometric * equivalence_ratio)
    air = gas.air(supply.humidity)
    pure = gas.fuel(fuel)
    fresh = Stream(
        dry * (1.0 + supply.humidity),
        gas.enthalpy(supply.temperature, supply.pressure, air),
        air,
    )
    fuel_enthalpy = supplied_enthalpy(gas, fuel, supply.fuel_temperature, supply.pressure)
    injected = Stream(fuel_flow, fuel_enthalpy, pure)
    flow = fresh.mass_flow + fuel_flow
    heat = (fresh.mass_flow * fresh.enthalpy + fuel_flow * injected.enthalpy) / flow
    mixed = (fresh.mass_flow * air + fuel_flow * pure) / flow
    burnt = gas.equilibrium(heat, supply.pressure, mixed)
    density = supply.pressure / (gas.gas_constant(burnt.mass_fractions) * burnt.temperature)
    steps = _FIRST_STEP * _GROWTH ** np.arange(_CELLS)
    times = np.cumsum(steps)
    cells = [
        Cell("burn-out", flow * step / density, end - step, end)
        for step, end in zip(steps.tolist(), times.tolist(), strict=True)
    ]
    primary = PrimaryZone(injected, fresh, flow * FLAME_TIME / density, 0.0, 0.0, 1)
    chain = burn(gas, supply.pressure, primary, cells)
    if chain.status != "burning":
        raise InfeasibleError(
            (
                f"the flame is to burn at an equivalence ratio of {equivalence_ratio:.2f}",
                f"a stirred flame of {1e3 * FLAME_TIME:.0f} ms has no burning state there",
            ),
            "Raise equivalence_ratio.primary.",
        )
    traced = dry_15_along(gas, chain.mass_fractions).co
    # what equilibrium holds cannot burn: nearly down to it is as far as length helps
    reached = max(wanted, NEARLY_DOWN * float(np.min(traced)))
    first = int(np.flatnonzero(traced <= reached)[0])
    time = 0.0 if first == 0 else float(_crossing(times, traced, first, reached))
    return Burnout(time, density, wanted, float(traced[0]), reached)


def _crossing(times: np.ndarray, traced: np.ndarray, first: int, wanted: float) -> float:
    """Return the time at which the falling CO passes the target, straight in its logarithm."""
    before = 0.0 if first == 1 else float(times[first - 2])
    after = float(times[first - 1])
    high, low = np.log(traced[first - 1]), np.log(max(traced[first], 1e-12))
    part = float((high - np.log(wanted)) / (high - low)) if high > low else 1.0
    return before + part * (after - before)
