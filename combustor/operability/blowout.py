"""Lean blow-out and light-off by the published correlation: a check beside the kinetics."""

from __future__ import annotations

import math

from combustor.base.method import Method

LEAN_BLOWOUT_LEFEBVRE = Method(
    key="lean-blowout-lefebvre",
    quantity="overall fuel-air ratio at lean blow-out",
    source="Lefebvre 1985, Journal of Engineering for Gas Turbines and Power 107: "
    "A/Vc x mA / (P^1.3 exp(T/300)) x Dr^2/(lam_r Hr), kPa, m3, kg/s",
    reading="from memory",
    validity={"pressure": (1e5, 1.5e6), "temperature": (290.0, 800.0)},
    scatter="A from 0.013 to 0.064 over eight aero combustors: a factor 2 either way",
    note="kerosene-type sprays; for a gas the drop terms are one and only heat per mass is scaled",
)
LEAN_LIGHT_OFF_LEFEBVRE = Method(
    key="lean-light-off-lefebvre",
    quantity="overall fuel-air ratio at lean light-off",
    source="Lefebvre 1985, as for lean blow-out with pressure exponent 1.5 and B of 0.13 to 0.51",
    reading="from memory",
    validity={"pressure": (2e4, 3e5), "temperature": (220.0, 400.0)},
    scatter="a factor 2 either way",
    note="low confidence: B is from memory of four engines",
)

BLOWOUT_CONSTANT = 0.032  # middle of the eight engines
LIGHT_OFF_CONSTANT = 0.39  # middle of four
LOADING_TEMPERATURE = 300.0  # K
REFERENCE_HEATING_VALUE = 43.5e6  # J/kg, JP-4
KILOPASCAL = 1000.0


def lean_blowout_lefebvre(
    air_flow: float,
    volume: float,
    pressure: float,
    temperature: float,
    lower_heating_value: float = REFERENCE_HEATING_VALUE,
    drop_ratio: float = 1.0,
    evaporation_ratio: float = 1.0,
    constant: float = BLOWOUT_CONSTANT,
) -> float:
    """Return the overall fuel-air ratio at lean blow-out.

    Parameters
    ----------
    air_flow : float
        Air of the combustor [kg/s]
    volume : float
        Ahead of the dilution holes, of as many cans as the air flow is of [m3]
    pressure, temperature : float
        Inlet totals [Pa], [K]
    lower_heating_value : float
        [J/kg]
    drop_ratio : float
        Mean drop size over that of JP-4 in the same injector; 1 for a gas [-]
    evaporation_ratio : float
        Evaporation constant over that of JP-4; 1 for a gas [-]
    constant : float
        Of the machine.

    Source
    ------
    ``LEAN_BLOWOUT_LEFEBVRE``.
    """
    return _lefebvre(
        constant, 1.3, air_flow, volume, pressure, temperature, lower_heating_value
    ) * (drop_ratio**2 / evaporation_ratio)


def lean_light_off_lefebvre(
    air_flow: float,
    volume: float,
    pressure: float,
    temperature: float,
    lower_heating_value: float = REFERENCE_HEATING_VALUE,
    drop_ratio: float = 1.0,
    evaporation_ratio: float = 1.0,
    constant: float = LIGHT_OFF_CONSTANT,
) -> float:
    """Return the overall fuel-air ratio at lean light-off; parameters as for blow-out.

    Source
    ------
    ``LEAN_LIGHT_OFF_LEFEBVRE``.
    """
    return _lefebvre(
        constant, 1.5, air_flow, volume, pressure, temperature, lower_heating_value
    ) * (drop_ratio**2 / evaporation_ratio)


def _lefebvre(
    constant: float,
    exponent: float,
    air_flow: float,
    volume: float,
    pressure: float,
    temperature: float,
    lower_heating_value: float,
) -> float:
    loading = air_flow / (
        (pressure / KILOPASCAL) ** exponent * math.exp(temperature / LOADING_TEMPERATURE)
    )
    return constant / volume * loading * REFERENCE_HEATING_VALUE / lower_heating_value
