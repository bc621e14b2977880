"""A quick look at one flame: equilibrium, and a stirred reactor of a given residence time."""

from __future__ import annotations

from dataclasses import dataclass
from math import isfinite
from typing import Literal

from combustor.base.errors import InputError, Problem
from combustor.emissions.exhaust import Emissions, from_gas
from combustor.fuel.gas import ISO_DAY_HUMIDITY, Array, Gas
from combustor.fuel.liquids import supplied_enthalpy
from combustor.fuel.record import Fuel
from combustor.kinetics.stirred import stirred

# SI; the temperatures are where the thermodynamic polynomials are defined
ALLOWED: dict[str, tuple[float, float]] = {
    "equivalence_ratio": (0.01, 20.0),
    "temperature": (200.0, 2500.0),
    "pressure": (1e3, 1e8),
    "residence_time": (1e-7, 1e3),
    "fuel_temperature": (200.0, 2500.0),
    "humidity": (0.0, 0.5),
}


@dataclass(frozen=True)
class StirredFlame:
    """The flame in a perfectly stirred adiabatic reactor.

    Parameters
    ----------
    status : {"burning", "blown_out", "not_converged"}
    temperature : float or None
        K; None unless burning.
    emissions : Emissions or None
        Of the gas leaving; None unless burning.
    residual : float
        Of the reactor's solve, in its own dimensionless measure.
    """

    status: Literal["burning", "blown_out", "not_converged"]
    temperature: float | None
    emissions: Emissions | None
    residual: float


@dataclass(frozen=True)
class Flame:
    """One mixture and what it becomes.

    Parameters
    ----------
    fuel : str
        Name.
    equivalence_ratio, fuel_air_ratio : float
        The latter kg fuel per kg dry air.
    temperature, pressure, humidity : float
        As given: of the mixture, or of the air when ``fuel_temperature`` is given (K), Pa,
        kg water per kg dry air.
    fuel_temperature : float or None
        K.
    mixture_temperature : float
        Unburnt, K.
    equilibrium_temperature : float
        Adiabatic, at constant pressure, dissociation and nitric oxide included, K.
    equilibrium : Emissions
        Of the equilibrium gas.
    residence_time : float or None
        Asked of the stirred reactor, s.
    stirred : StirredFlame or None
        None when no residence time was given.
    """

    fuel: str
    equivalence_ratio: float
    fuel_air_ratio: float
    temperature: float
    pressure: float
    humidity: float
    fuel_temperature: float | None
    mixture_temperature: float
    equilibrium_temperature: float
    equilibrium: Emissions
    residence_time: float | None = None
    stirred: StirredFlame | None = None


def flame(
    fuel: Fuel,
    gas: Gas,
    equivalence_ratio: float,
    temperature: float,
    pressure: float,
    residence_time: float | None = None,
    fuel_temperature: float | None = None,
    humidity: float = ISO_DAY_HUMIDITY,
) -> Flame:
    """Burn one mixture adiabatically.

    Parameters
    ----------
    fuel : Fuel
    gas : Gas
        The mechanism.
    equivalence_ratio : float
    temperature : float
        Of the premixed gas; of the air alone when ``fuel_temperature`` is given, K.
    pressure : float
        Absolute, Pa.
    residence_time : float, optional
        Of a stirred reactor, s.
    fuel_temperature : float, optional
        K.
    humidity : float
        kg water per kg dry air.

    Raises
    ------
    InputError
        Any argument outside ``ALLOWED``, all of them at once.
    """
    _check(
        equivalence_ratio=equivalence_ratio,
        temperature=temperature,
        pressure=pressure,
        residence_time=residence_time,
        fuel_temperature=fuel_temperature,
        humidity=humidity,
    )
    fuel_air_ratio = equivalence_ratio * fuel.stoichiometric_fuel_air_ratio
    share = fuel_air_ratio / (1.0 + humidity + fuel_air_ratio)
    air, pure = gas.air(humidity), gas.fuel(fuel)
    mixture = share * pure + (1.0 - share) * air
    if fuel_temperature is None:  # premixed: a liquid fuel is vapour then
        enthalpy = share * gas.enthalpy(temperature, pressure, pure)
    else:
        enthalpy = share * supplied_enthalpy(gas, fuel, fuel_temperature, pressure)
    enthalpy += (1.0 - share) * gas.enthalpy(temperature, pressure, air)
    burnt = gas.equilibrium(enthalpy, pressure, mixture)
    return Flame(
        fuel=fuel.name,
        equivalence_ratio=equivalence_ratio,
        fuel_air_ratio=fuel_air_ratio,
        temperature=temperature,
        pressure=pressure,
        humidity=humidity,
        fuel_temperature=fuel_temperature,
        mixture_temperature=gas.temperature(enthalpy, pressure, mixture, temperature),
        equilibrium_temperature=burnt.temperature,
        equilibrium=from_gas(gas, burnt.mass_fractions, 1.0, share, fuel),
        residence_time=residence_time,
        stirred=None
        if residence_time is None
        else _stirred(fuel, gas, pressure, enthalpy, mixture, share, residence_time),
    )


def _stirred(
    fuel: Fuel,
    gas: Gas,
    pressure: float,
    enthalpy: float,
    mixture: Array,
    share: float,
    residence_time: float,
) -> StirredFlame:
    solved = stirred(gas, pressure, enthalpy, mixture, residence_time=residence_time)
    if solved.status != "burning":
        return StirredFlame(solved.status, None, None, solved.residual)
    return StirredFlame(
        solved.status,
        solved.state.temperature,
        from_gas(gas, solved.state.mass_fractions, 1.0, share, fuel),
        solved.residual,
    )


def _check(**given: float | None) -> None:
    problems = []
    for name, value in given.items():
        low, high = ALLOWED[name]
        if value is not None and not (isfinite(value) and low <= value <= high):
            problems.append(
                Problem(
                    "outside what can be worked out",
                    key=name,
                    value=value,
                    allowed=f"give {low:g} to {high:g} in SI units",
                )
            )
    if problems:
        raise InputError(problems)
