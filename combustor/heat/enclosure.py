"""Radiation between the liner's outside and the casing, and the casing's own balance."""

from __future__ import annotations

import numpy as np

from combustor.base.method import Method
from combustor.hardware.metal import LinerWall
from combustor.heat.gas_radiation import STEFAN_BOLTZMANN
from combustor.heat.sides import Casing, FloatArray

ENCLOSURE = Method(
    key="grey-enclosure",
    quantity="radiation from liner to casing",
    source="two long grey surfaces, one inside the other: ew ec / (ec + ew (1 - ec) Aw / Ac)",
    reading="derived",
    note="published ready values: 0.6 steel casing, 0.4 aluminium",
)
CASING_BALANCE = Method(
    key="casing-balance",
    quantity="casing temperature and the heat it loses",
    source="radiation received = heat handed to annulus air + heat lost to ambient, the air "
    "side with the liner's own coefficient",
    reading="derived",
    note="without a stated loss coefficient the casing is at the air's temperature; Suo, Liang "
    "and Chin 2009 point out that it need not be",
)


def exchange_factor(wall_emissivity: float, casing_emissivity: float, area_ratio: float) -> float:
    """Grey-enclosure factor on sigma (T_w^4 - T_casing^4), per liner area.

    ``area_ratio`` is liner outside area over casing inside area.
    """
    ew, ec = wall_emissivity, casing_emissivity
    return ew * ec / (ec + ew * (1.0 - ec) * area_ratio)


def exchange_factor_of(wall: LinerWall) -> float:
    """Grey-enclosure factor of a liner wall in its casing."""
    return exchange_factor(wall.emissivity, wall.casing_emissivity, wall.casing_area_ratio)


def casing_temperature(
    cold_side: FloatArray,
    air_temperature: FloatArray,
    air_coefficient: FloatArray,
    factor: float,
    area_ratio: float,
    casing: Casing,
) -> tuple[FloatArray, FloatArray]:
    """Casing temperature, K, and its slope with the liner's cold-side temperature.

    Solves factor sigma (T_2^4 - T_c^4) = [h (T_c - T_a) + U (T_c - T_ambient)] / area_ratio.
    """
    if casing.loss_coefficient is None:
        return air_temperature, np.zeros_like(air_temperature)
    to_air = air_coefficient / area_ratio
    to_ambient = casing.loss_coefficient / area_ratio
    black = factor * STEFAN_BOLTZMANN
    received = black * cold_side**4 + to_air * air_temperature
    received = received + to_ambient * casing.ambient_temperature
    # The residual rises and is convex, so Newton from above the root cannot overshoot it.
    T = np.maximum(np.maximum(cold_side, air_temperature), casing.ambient_temperature)
    for _ in range(50):
        slope = to_air + to_ambient + 4.0 * black * T**3
        step = ((to_air + to_ambient) * T + black * T**4 - received) / slope
        T = T - step
        if float(np.max(np.abs(step))) <= 1e-11 * float(np.max(T)):
            break
    slope = to_air + to_ambient + 4.0 * black * T**3
    return T, 4.0 * black * cold_side**3 / slope
