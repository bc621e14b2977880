"""Sauter mean drop size of pressure-swirl and prefilming airblast atomisers."""

from __future__ import annotations

from dataclasses import dataclass
from math import cos

from combustor.base.method import Method

PRESSURE_SWIRL_LEFEBVRE = Method(
    key="drop-size-pressure-swirl-lefebvre",
    quantity="Sauter mean drop size of a pressure-swirl atomiser",
    source="Lefebvre 1987, Atomization of fuel nozzles: "
    "2.25 sig^0.25 mu^0.25 m^0.25 dP^-0.5 rho_A^-0.25",
    reading="from memory",
    validity={
        "surface_tension": (0.02, 0.07),
        "viscosity": (1e-3, 15e-3),
        "air_density": (0.5, 12.0),
    },
    scatter="15 to 20 %",
    note="the exponent of air density is uncertain above about 15 bar",
)
PRESSURE_SWIRL_WANG = Method(
    key="drop-size-pressure-swirl-wang",
    quantity="Sauter mean drop size of a pressure-swirl atomiser, film thickness counted",
    source="Wang and Lefebvre 1987, J. Propulsion and Power 3; film thickness "
    "2.7 (d0 FN mu / (dP rho)^0.5)^0.25",
    reading="from memory",
    validity=PRESSURE_SWIRL_LEFEBVRE.validity,
    scatter="15 to 20 %",
)
PREFILMING_AIRBLAST = Method(
    key="drop-size-prefilming-el-shanawany",
    quantity="Sauter mean drop size of a prefilming airblast atomiser",
    source="El-Shanawany and Lefebvre 1980, J. Energy 4 (lips of 19 to 76 mm)",
    reading="from memory",
    validity={
        "surface_tension": (0.02, 0.07),
        "viscosity": (1e-3, 15e-3),
        "air_liquid_ratio": (1.5, 50.0),
        "air_density": (0.5, 12.0),
    },
    scatter="10 to 20 %",
)


@dataclass(frozen=True)
class Injection:
    """Liquid and air at one atomiser.

    Parameters
    ----------
    liquid_flow : float
        Through one atomiser, kg/s.
    density, viscosity, surface_tension : float
        Of the liquid: kg/m3, Pa s, N/m.
    air_density : float
        kg/m3.
    """

    liquid_flow: float
    density: float
    viscosity: float
    surface_tension: float
    air_density: float


def pressure_swirl_lefebvre(injection: Injection, pressure_drop: float) -> float:
    """Return the drop size of a pressure-swirl atomiser, m.

    Parameters
    ----------
    injection : Injection
    pressure_drop : float
        Across the atomiser, Pa.

    Source
    ------
    ``PRESSURE_SWIRL_LEFEBVRE``.
    """
    liquid = injection.surface_tension * injection.viscosity * injection.liquid_flow
    return 2.25 * liquid**0.25 * pressure_drop**-0.5 * injection.air_density**-0.25


def pressure_swirl_wang(
    injection: Injection, pressure_drop: float, orifice_diameter: float, cone_angle: float
) -> float:
    """Return the drop size of a pressure-swirl atomiser, its film counted, m.

    Parameters
    ----------
    injection : Injection
    pressure_drop : float
        Pa.
    orifice_diameter : float
        m.
    cone_angle : float
        Whole angle of the spray, rad.

    Source
    ------
    ``PRESSURE_SWIRL_WANG``.
    """
    i, drop = injection, pressure_drop
    number = flow_number(i.liquid_flow, drop, i.density)
    film = 2.7 * (orifice_diameter * number * i.viscosity / (drop * i.density) ** 0.5) ** 0.25
    thin = film * cos(0.5 * cone_angle)
    viscous = (i.surface_tension * i.viscosity**2 / (i.air_density * drop**2)) ** 0.25
    inertial = (i.surface_tension * i.density / (i.air_density * drop)) ** 0.25
    return 4.52 * viscous * thin**0.25 + 0.39 * inertial * thin**0.75


def prefilming_airblast(
    injection: Injection,
    air_velocity: float,
    air_liquid_ratio: float,
    prefilmer_diameter: float,
    hydraulic_diameter: float,
) -> float:
    """Return the drop size of a prefilming airblast atomiser, m.

    Parameters
    ----------
    injection : Injection
    air_velocity : float
        m/s.
    air_liquid_ratio : float
        By mass.
    prefilmer_diameter, hydraulic_diameter : float
        Of the lip, and of the air duct at its exit, m.

    Source
    ------
    ``PREFILMING_AIRBLAST``.
    """
    i, lip = injection, prefilmer_diameter
    weber = i.surface_tension / (i.air_density * air_velocity**2 * lip)
    inertial = 0.33 * weber**0.6 * (i.density / i.air_density) ** 0.1
    viscous = 0.068 * (i.viscosity**2 / (i.density * i.surface_tension * lip)) ** 0.5
    return hydraulic_diameter * (1.0 + 1.0 / air_liquid_ratio) * (inertial + viscous)


def flow_number(liquid_flow: float, pressure_drop: float, density: float) -> float:
    """Return the flow number of an atomiser, m2."""
    return liquid_flow / (pressure_drop * density) ** 0.5


def pressure_drop_of(liquid_flow: float, number: float, density: float) -> float:
    """Return the pressure drop that drives a flow through an atomiser of a flow number, Pa."""
    return (liquid_flow / number) ** 2 / density
