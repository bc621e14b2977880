"""Coefficients and emissivity along the axis, from the gas and air as given."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from combustor.heat import transport
from combustor.heat.convection import (
    DUCT_CONSTANT,
    RECIRCULATING_CONSTANT,
    duct_coefficient,
)
from combustor.heat.gas_radiation import emissivity_luminous
from combustor.heat.grey_gas import emissivity_grey_gas
from combustor.heat.sides import AnnulusSide, FloatArray, GasSide, Radiation


def gas_emissivity(
    gas: GasSide, x: FloatArray, beam_length: float, radiation: Radiation
) -> FloatArray:
    """Emissivity of the gas at stations ``x`` (m) by the chosen law; path in m."""
    pressure, temperature = gas.at("pressure", x), gas.at("temperature", x)
    if radiation.kind == "luminous":
        return emissivity_luminous(
            pressure,
            temperature,
            gas.at("fuel_air_ratio", x),
            beam_length,
            radiation.luminosity,
            radiation.constant,
        )
    return emissivity_grey_gas(
        pressure,
        temperature,
        gas.at("x_h2o", x),
        gas.at("x_co2", x),
        beam_length,
        radiation.broadening,
    )


def gas_viscosity(gas: GasSide, x: FloatArray) -> FloatArray:
    """Viscosity of the gas at stations ``x`` (m), Pa s: as given, else the fit."""
    if gas.viscosity is not None:
        return gas.at("viscosity", x)
    return transport.viscosity(gas.at("temperature", x), gas.at("x_h2o", x), gas.at("x_co2", x))


def gas_conductivity(gas: GasSide, x: FloatArray) -> FloatArray:
    """Conductivity of the gas at stations ``x`` (m), W/m/K: as given, else the fit."""
    if gas.conductivity is not None:
        return gas.at("conductivity", x)
    return transport.conductivity(gas.at("temperature", x), gas.at("x_h2o", x), gas.at("x_co2", x))


def unfilmed_coefficient(
    gas: GasSide, x: FloatArray, recirculating: NDArray[np.bool_]
) -> FloatArray:
    """Convection coefficient of the gas on a wall without film, W/m2/K.

    ``recirculating`` is True at the stations inside the primary zone.
    """
    constant = np.where(recirculating, RECIRCULATING_CONSTANT, DUCT_CONSTANT)
    return duct_coefficient(
        gas_conductivity(gas, x),
        gas.at("hydraulic_diameter", x),
        gas.at("mass_flow", x) / gas.at("area", x),
        gas_viscosity(gas, x),
        constant,
    )


def annulus_coefficient(air: AnnulusSide, x: FloatArray) -> FloatArray:
    """Convection coefficient of the annulus air at stations ``x`` (m), W/m2/K."""
    temperature = air.at("temperature", x)
    mu = transport.viscosity(temperature) if air.viscosity is None else air.at("viscosity", x)
    k = (
        transport.conductivity(temperature)
        if air.conductivity is None
        else air.at("conductivity", x)
    )
    flux = air.at("mass_flow", x) / air.at("area", x)
    return air.enhancement * duct_coefficient(k, air.at("hydraulic_diameter", x), flux, mu)
