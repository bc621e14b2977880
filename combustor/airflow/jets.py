"""Jets in the liner: momentum ratio, penetration, trajectory, number, mixing length."""

from __future__ import annotations

import math

from combustor.base.method import Method
from combustor.gasdynamics import Number

PENETRATION = Method(
    key="penetration-norster",
    quantity="largest penetration of a round jet",
    source="Norster 1964, Cranfield, as quoted by Lefebvre 1983: 1.15 d sqrt(J) sin(angle)",
    reading="from memory",
    note="d is the contracted jet, hole diameter times sqrt(Cd)",
)
PENETRATION_ROW = Method(
    key="penetration-can-row",
    quantity="largest penetration of a row of round jets in a can",
    source="Norster 1964, as quoted by Lefebvre 1983: 1.25 d sqrt(J) m_g / (m_g + m_j)",
    reading="from memory",
)
TRAJECTORY = Method(
    key="trajectory-norster",
    quantity="trajectory of a round jet",
    source="as quoted by Lefebvre 1983: Y/d = 0.82 sqrt(J) (X/d)^0.33",
    reading="from memory",
)
HOLE_NUMBER = Method(
    key="hole-number",
    quantity="number of holes times the square of the jet diameter",
    source="continuity at the jet velocity sqrt(2 dP / rho); 15.25 in Lefebvre 1983",
    reading="derived",
)
ENTRAINMENT = Method(
    key="entrainment-ricou-spalding",
    quantity="path along which a jet entrains a given mass",
    source="Ricou and Spalding 1961, J. Fluid Mech. 11: m/m0 = 0.32 sqrt(rho_gas/rho_jet) s/d",
    reading="from memory",
    note="a free jet at rest; cross-flow speeds it up, so the length is an upper estimate",
)


def momentum_flux_ratio(
    jet_density: Number, jet_velocity: Number, gas_density: Number, gas_velocity: Number
) -> Number:
    """Return J = (rho V^2) of the jet over (rho U^2) of the local hot gas; kg/m3 and m/s."""
    return jet_density * jet_velocity**2 / (gas_density * gas_velocity**2)


def jet_diameter(hole_diameter: float, discharge_coefficient: float) -> float:
    """Return the contracted jet's diameter, m: hole diameter times sqrt(Cd)."""
    return hole_diameter * math.sqrt(discharge_coefficient)


def penetration_single(diameter: float, momentum_ratio: float, angle: float) -> float:
    """Return the largest penetration of one jet, m.

    Parameters
    ----------
    diameter : float
        Of the jet, m.
    momentum_ratio : float
        J, with the local hot gas.
    angle : float
        Initial jet angle from the axis, rad.
    """
    return 1.15 * diameter * math.sqrt(momentum_ratio) * math.sin(angle)


def penetration_row(
    diameter: float, momentum_ratio: float, gas_flow: float, jet_flow: float
) -> float:
    """Return the largest penetration of a row of jets in a can, m.

    Parameters
    ----------
    diameter : float
        Of one jet, m.
    momentum_ratio : float
        J, with the local hot gas.
    gas_flow, jet_flow : float
        Hot gas reaching the row and all its jets, kg/s.
    """
    return 1.25 * diameter * math.sqrt(momentum_ratio) * gas_flow / (gas_flow + jet_flow)


def trajectory(diameter: float, momentum_ratio: float, downstream: float) -> float:
    """Return the depth of a jet's centre line, m, ``downstream`` (m) of its hole."""
    return 0.82 * diameter * math.sqrt(momentum_ratio) * (downstream / diameter) ** 0.33


def holes_times_diameter_squared(
    mass_flow: float,
    pressure: float,
    temperature: float,
    pressure_difference: float,
    gas_constant: float = 287.05,
) -> float:
    """Return number of jets times jet diameter squared, m2, for a wanted flow (incompressible).

    Parameters
    ----------
    mass_flow : float
        kg/s.
    pressure, temperature : float
        Of the annulus air, Pa and K.
    pressure_difference : float
        Across the liner, Pa.
    gas_constant : float
        J/kg/K.
    """
    ideal_flux = math.sqrt(2.0 * pressure_difference * pressure / (gas_constant * temperature))
    return 4.0 / math.pi * mass_flow / ideal_flux


def entrainment_length(
    diameter: float, mass_ratio: float, gas_density: float, jet_density: float
) -> float:
    """Return the path, m, along which a jet has entrained ``mass_ratio`` times its own mass.

    Parameters
    ----------
    diameter : float
        Of the jet, m.
    mass_ratio : float
        Entrained over jet mass; gas flow over jet flow for complete mixing.
    gas_density, jet_density : float
        kg/m3.
    """
    return diameter * (1.0 + mass_ratio) / (0.32 * math.sqrt(gas_density / jet_density))
