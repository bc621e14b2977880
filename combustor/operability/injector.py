"""A fuel injector as an orifice, and how well one fuel stands in for another."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import sqrt

from scipy.optimize import brentq

from combustor import gasdynamics
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method

INJECTOR_ORIFICE = Method(
    key="injector-orifice",
    quantity="fuel flow through an injector",
    source="isentropic expansion of an ideal gas to the liner pressure, sonic at most",
    reading="derived",
    note="one effective area for all fuels; the rule of squared Wobbe ratios fails above 1.6",
)
WEAVER_SPEED = Method(
    key="weaver-flame-speed-factor",
    quantity="flame-speed factor of a gas mixture",
    source="Weaver 1951: sum F x / (sum A x + 5 Z - 18.8 Q + 1)",
    reading="as given in",
    note="atmospheric aerated burners: a trend for turbines, never a limit",
)
MODIFIED_WOBBE = Method(
    key="modified-wobbe",
    quantity="Wobbe index corrected for fuel temperature",
    source="lower heat per volume (Btu/scf, 60 degF) over root of relative density times fuel "
    "temperature in degrees Rankine",
    reading="common practice, no source",
    note="makers differ; plus or minus 5 % is the usual allowance of one nozzle",
)

BTU_PER_SCF = 26.84  # in MJ/m3 at 15 degC: heat per volume in the index's unit
RANKINE = 1.8
LARGEST_RATIO = 50.0
WOBBE_WINDOW = 0.05

# Flame speed factor F and stoichiometric air volumes A of Weaver.
_WEAVER: Mapping[str, tuple[float, float]] = {
    "H2": (339.0, 2.39),
    "CO": (61.0, 2.39),
    "CH4": (148.0, 9.55),
    "C2H6": (301.0, 16.71),
    "C3H8": (398.0, 23.87),
}
_INERT = ("N2", "CO2", "AR", "HE", "H2O")


@dataclass(frozen=True)
class Vapour:
    """A gaseous fuel as an orifice sees it.

    Parameters
    ----------
    temperature : float
        [K]
    gas_constant : float
        [J/(kg K)]
    heat_capacity_ratio : float
        [-]
    """

    temperature: float
    gas_constant: float
    heat_capacity_ratio: float


def flow(vapour: Vapour, effective_area: float, ratio: float, pressure: float) -> float:
    """Return the fuel flow, kg/s.

    Parameters
    ----------
    vapour : Vapour
    effective_area : float
        [m2]
    ratio : float
        Pressure ahead of the injector over that in the liner [-]
    pressure : float
        In the liner [Pa]

    Source
    ------
    ``INJECTOR_ORIFICE``.
    """
    return effective_area * float(
        gasdynamics.orifice_flux(
            ratio * pressure,
            vapour.temperature,
            pressure,
            vapour.gas_constant,
            vapour.heat_capacity_ratio,
        )
    )


def effective_area_for(vapour: Vapour, fuel_flow: float, ratio: float, pressure: float) -> float:
    """Return the effective area that passes a flow at a pressure ratio, m2."""
    return fuel_flow / flow(vapour, 1.0, ratio, pressure)


def pressure_ratio_for(
    vapour: Vapour, fuel_flow: float, effective_area: float, pressure: float
) -> float:
    """Return the pressure ratio that drives a flow through an injector [-].

    Raises
    ------
    InputError
        More than fifty would be needed.
    """

    def gap(ratio: float) -> float:
        return flow(vapour, effective_area, ratio, pressure) - fuel_flow

    if fuel_flow <= 0.0:
        return 1.0
    if gap(LARGEST_RATIO) < 0.0:
        raise InputError(
            Problem(
                "the injector cannot pass this fuel",
                f"a pressure ratio above {LARGEST_RATIO:.0f} would be needed: open its area",
                "injector",
                effective_area,
            )
        )
    return float(brentq(gap, 1.0, LARGEST_RATIO, xtol=1e-12, rtol=1e-12))


def is_choked(vapour: Vapour, ratio: float) -> bool:
    """Say whether the injector's throat is sonic at a pressure ratio."""
    return 1.0 / ratio <= float(gasdynamics.critical_pressure_ratio(vapour.heat_capacity_ratio))


def modified_wobbe(
    lower_heat_per_volume: float, relative_density: float, temperature: float
) -> float:
    """Return the Wobbe index corrected for fuel temperature, Btu/scf/degR^0.5.

    Parameters
    ----------
    lower_heat_per_volume : float
        At 15 degC and 101.325 kPa [J/m3]
    relative_density : float
        To air [-]
    temperature : float
        Of the fuel at the injector [K]

    Source
    ------
    ``MODIFIED_WOBBE``.
    """
    heat = 1e-6 * lower_heat_per_volume * BTU_PER_SCF
    return heat / sqrt(relative_density * temperature * RANKINE)


def weaver_factor(composition: Mapping[str, float]) -> float | None:
    """Return Weaver's flame-speed factor (hydrogen 100), or None where a part has no figure.

    Source
    ------
    ``WEAVER_SPEED``.
    """
    sums = _weaver_sums(composition)
    if sums is None:
        return None
    speed, air, inert, oxygen = sums
    return speed / (air + 5.0 * inert - 18.8 * oxygen + 1.0)


@dataclass(frozen=True)
class Interchange:
    """How a gas behaves in a burner set for another: Weaver's indices of 1951 [-].

    Parameters
    ----------
    heat, primary_air, lifting, flashback : float
    """

    heat: float
    primary_air: float
    lifting: float
    flashback: float


def interchange(
    substitute: Mapping[str, float],
    adjustment: Mapping[str, float],
    wobbe_ratio: float,
    density_ratio: float,
) -> Interchange | None:
    """Return Weaver's indices, or None where a part of either gas has no figure.

    Parameters
    ----------
    substitute, adjustment : mapping of str to float
        Mole fractions of the gas to be burnt and of the gas the burner was set for.
    wobbe_ratio : float
        Of the two, higher heating values, substitute over adjustment [-]
    density_ratio : float
        Relative density, substitute over adjustment [-]
    """
    new, old = _weaver_sums(substitute), _weaver_sums(adjustment)
    speed, before = weaver_factor(substitute), weaver_factor(adjustment)
    if new is None or old is None or speed is None or before is None:
        return None
    primary_air = new[1] / old[1] / sqrt(density_ratio)
    lifting = primary_air * speed / before * (1.0 - new[3]) / (1.0 - old[3])
    return Interchange(wobbe_ratio, primary_air, lifting, speed / before - 1.4 * primary_air + 0.4)


def _weaver_sums(composition: Mapping[str, float]) -> tuple[float, float, float, float] | None:
    speed = air = inert = oxygen = 0.0
    for name, share in composition.items():
        if share <= 0.0:
            continue
        if name.upper() in _WEAVER:
            factor, volumes = _WEAVER[name.upper()]
            speed += factor * share
            air += volumes * share
        elif name.upper() in _INERT:
            inert += share
        elif name.upper() == "O2":
            oxygen += share
        else:
            return None
    return speed, air, inert, oxygen
