"""Ignition delay of a premixed charge by published correlations, and how much of it is allowed."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import partial

from combustor.base.method import Method

ATMOSPHERE = 101325.0  # Pa
CALORIES = 1.987  # cal/(mol K)
GAS_CONSTANT = 8.314462618  # J/(mol K)

DELAY_JET_A = Method(
    key="ignition-delay-jet-a",
    quantity="ignition delay of Jet-A",
    source="Spadaccini & TeVelde 1982 (NASA CR-159886, 1980): 1.68e-8 P^-2 exp(37780/(1.987 T)), "
    "ms, atm",
    reading="from memory",
    validity={"pressure": (1.0e6, 3.1e6), "temperature": (650.0, 900.0)},
    scatter="factor 3 to 5 against n-dodecane kinetics",
    note="in milliseconds: as seconds it would be a thousand times the report's range; a single "
    "exponential misses the negative temperature coefficient of kerosene",
)
DELAY_DIESEL = Method(
    key="ignition-delay-diesel",
    quantity="ignition delay of No. 2 diesel",
    source="Spadaccini & TeVelde 1982: 2.43e-9 P^-2 exp(41560/(1.987 T)), ms, atm",
    reading="from memory",
    validity={"pressure": (1.0e6, 3.1e6), "temperature": (650.0, 900.0)},
    scatter="factor 3 to 5",
)
DELAY_NATURAL_GAS = Method(
    key="ignition-delay-natural-gas",
    quantity="ignition delay of natural gas",
    source="Spadaccini & Colket 1994: 1.77e-14 exp(18693/T) [O2]^-1.05 [CH4]^0.66 [HC]^-0.39, "
    "mol/cm3, HC all above methane",
    reading="from memory",
    validity={"temperature": (1200.0, 2000.0), "pressure": (3e5, 2.5e6)},
    scatter="factor 3 and more below 1000 K",
    note="shock-tube range; engine temperatures are an extrapolation",
)
DELAY_METHANE = Method(
    key="ignition-delay-methane",
    quantity="ignition delay of methane",
    source="Spadaccini & Colket 1994: 2.21e-14 exp(22659/T) [O2]^-1.05 [CH4]^0.33, mol/cm3",
    reading="from memory",
    validity={"temperature": (1200.0, 2000.0), "pressure": (3e5, 2.5e6)},
    scatter="factor 3 and more below 1000 K",
    note="shock-tube range; engine temperatures are an extrapolation",
)
SAFETY_FACTOR = Method(
    key="autoignition-safety-factor",
    quantity="ignition delay asked for over residence time in the premixer",
    source="3 for kerosene and natural gas, 5 with hydrogen, doubled where the delay is an "
    "extrapolation",
    reading="common practice, no source",
)

KEROSENE_FACTOR, HYDROGEN_FACTOR, EXTRAPOLATION_FACTOR = 3.0, 5.0, 2.0
HYDROGEN_SHARE = 0.05  # mole fraction of the fuel from which the hydrogen factor is asked


def delay_jet_a(temperature: float, pressure: float) -> float:
    """Return the ignition delay of Jet-A [s] at ``temperature`` (K) and ``pressure`` (Pa).

    Source: ``DELAY_JET_A``.
    """
    return _power_of_pressure(1.68e-8, 37780.0, temperature, pressure)


def delay_diesel(temperature: float, pressure: float) -> float:
    """Return the ignition delay of No. 2 diesel [s]; source: ``DELAY_DIESEL``."""
    return _power_of_pressure(2.43e-9, 41560.0, temperature, pressure)


def _power_of_pressure(factor: float, energy: float, temperature: float, pressure: float) -> float:
    milliseconds = (
        factor * (pressure / ATMOSPHERE) ** -2 * math.exp(energy / (CALORIES * temperature))
    )
    return 1e-3 * milliseconds


def delay_natural_gas(
    temperature: float, pressure: float, oxygen: float, methane: float, heavier: float
) -> float:
    """Return the ignition delay of natural gas, or of methane where nothing heavier is in it.

    Parameters
    ----------
    temperature, pressure : float
        Of the mixture [K], [Pa]
    oxygen, methane, heavier : float
        Mole fractions in the mixture; ``heavier`` all hydrocarbons above methane [-]

    Returns
    -------
    float
        [s]

    Source
    ------
    ``DELAY_NATURAL_GAS``, ``DELAY_METHANE``.
    """
    moles = pressure / (GAS_CONSTANT * temperature) * 1e-6  # mol/cm3
    if heavier <= 0.0:
        return (
            2.21e-14
            * math.exp(22659.0 / temperature)
            * (moles * oxygen) ** -1.05
            * (moles * methane) ** 0.33
        )
    return (
        1.77e-14
        * math.exp(18693.0 / temperature)
        * (moles * oxygen) ** -1.05
        * (moles * methane) ** 0.66
        * (moles * heavier) ** -0.39
    )


@dataclass(frozen=True)
class Delay:
    """One estimate of an ignition delay.

    Parameters
    ----------
    seconds : float
        At least this long where ``is_bound`` [s]
    method : Method
    is_extrapolated : bool
        Temperature or pressure outside the method's range.
    is_bound : bool
        The charge had not ignited when the count was ended.
    """

    seconds: float
    method: Method
    is_extrapolated: bool
    is_bound: bool = False


def correlated(
    fuel: Mapping[str, float],
    mixture: Mapping[str, float],
    temperature: float,
    pressure: float,
    carbon_number: float,
) -> Delay | None:
    """Return the correlation's delay for a fuel, or None where there is none.

    Parameters
    ----------
    fuel : mapping of str to float
        Mole fractions of the fuel.
    mixture : mapping of str to float
        Mole fractions of fuel and air together; oxygen as "O2".
    temperature, pressure : float
        [K], [Pa]
    carbon_number : float
        Mean carbon atoms per molecule of fuel [-]
    """
    formula: Callable[[], float]
    if carbon_number > 6.0:
        method = DELAY_DIESEL if carbon_number > 13.0 else DELAY_JET_A
        jet = delay_diesel if carbon_number > 13.0 else delay_jet_a
        formula = partial(jet, temperature, pressure)
    elif fuel.get("CH4", 0.0) >= 0.5 and fuel.get("H2", 0.0) < HYDROGEN_SHARE:
        methane = mixture["CH4"]
        heavier = sum(mixture.get(s, 0.0) for s in ("C2H6", "C3H8", "C2H4", "C4H10"))
        method = DELAY_NATURAL_GAS if heavier > 0.0 else DELAY_METHANE
        formula = partial(delay_natural_gas, temperature, pressure, mixture["O2"], methane, heavier)
    else:
        return None
    outside = bool(method.notices(temperature=temperature, pressure=pressure))
    return Delay(formula(), method, outside)


def safety_factor(hydrogen_share: float, is_extrapolated: bool) -> float:
    """Return the delay asked for over the residence time [-]; source: ``SAFETY_FACTOR``."""
    factor = HYDROGEN_FACTOR if hydrogen_share >= HYDROGEN_SHARE else KEROSENE_FACTOR
    return factor * (EXTRAPOLATION_FACTOR if is_extrapolated else 1.0)
