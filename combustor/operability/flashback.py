"""Screens for a flame that runs back into a premixer: core flow, wall layer, vortex core."""

from __future__ import annotations

from combustor.base.method import Method

TURBULENT_VELOCITY_ZIMONT = Method(
    key="turbulent-burning-velocity-zimont",
    quantity="turbulent burning velocity",
    source="Zimont 1979: 0.52 u'^0.75 S_L^0.5 alpha^-0.25 l^0.25",
    reading="from memory",
    note="0.52 for hydrocarbons; lean hydrogen burns faster than this by its low Lewis number",
)
TURBULENT_VELOCITY_DAMKOEHLER = Method(
    key="turbulent-burning-velocity-damkoehler",
    quantity="turbulent burning velocity",
    source="Damkoehler 1940: S_L + u'",
    reading="from memory",
)
WALL_GRADIENT = Method(
    key="wall-velocity-gradient",
    quantity="velocity gradient at the wall of a smooth duct",
    source="Blasius friction: 0.0396 U^1.75 nu^-0.75 D^-0.25; laminar 8 U / D",
    reading="derived",
    validity={"reynolds": (4e3, 1e5)},
)
CRITICAL_GRADIENT = Method(
    key="critical-gradient-flashback",
    quantity="wall gradient below which a flame runs back along the wall",
    source="tube burners at one atmosphere: about 400 1/s methane, 1e4 1/s hydrogen at most; "
    "scaled with S_L^2/alpha",
    reading="from memory",
    scatter="a flame confined in the duct runs back at several times this (Eichler & Sattelmayer, "
    "GT2011)",
)
FLASHBACK_FACTORS = Method(
    key="flashback-safety-factors",
    quantity="velocity or gradient asked for over that of the flame",
    source="core 1.5 to 2 natural gas, 2 to 3 hydrogen; wall gradient 2 at least; upper ends taken",
    reading="common practice, no source",
)
VORTEX_CORE = Method(
    key="vortex-core-flashback",
    quantity="flashback along the core of the vortex",
    source="a swirl number above 0.5 with no hub to the end of the passage is a risk",
    reading="common practice, no source",
)

HYDROGEN_SPEED_UP = Method(
    key="hydrogen-turbulent-speed-up",
    quantity="turbulent burning velocity of lean hydrogen over that of a hydrocarbon alike",
    source="flames of low Lewis number wrinkle by themselves: 2 to 10 times seen; 4 taken for pure "
    "hydrogen, in proportion for blends",
    reading="judgement",
)

CORE_FACTOR, CORE_FACTOR_HYDROGEN = 2.0, 3.0
WALL_FACTOR = 2.0
PURE_HYDROGEN_SPEED_UP = 4.0
SWIRLED_HYDROGEN = 0.3  # share of the fuel from which nothing is said of a swirling passage
CONFINEMENT = 5.0  # a confined flame over the tube burner's critical gradient, judgement
RISKY_SWIRL = 0.5
TURBULENCE_INTENSITY = 0.10  # of the passage velocity, behind vanes; judgement
TURBULENCE_SCALE = 0.1  # of the passage height; judgement
TURBULENT_REYNOLDS = 2300.0
# Wall gradient times diffusivity over S_L squared, from methane at 0.37 m/s and 2.2e-5 m2/s.
GRADIENT_NUMBER = 400.0 * 2.2e-5 / 0.37**2
GRADIENT_NUMBER_HYDROGEN = 1e4 * 7.0e-5 / 2.3**2


def turbulent_velocity_zimont(
    fluctuation: float, laminar: float, diffusivity: float, scale: float
) -> float:
    """Return the turbulent burning velocity.

    Parameters
    ----------
    fluctuation : float
        Root mean square of the velocity [m/s]
    laminar : float
        Laminar burning velocity [m/s]
    diffusivity : float
        Thermal, of the unburnt mixture [m2/s]
    scale : float
        Integral length [m]

    Source
    ------
    ``TURBULENT_VELOCITY_ZIMONT``.
    """
    return 0.52 * fluctuation**0.75 * laminar**0.5 * diffusivity**-0.25 * scale**0.25


def turbulent_velocity_damkoehler(fluctuation: float, laminar: float) -> float:
    """Return the turbulent burning velocity [m/s]; source: ``TURBULENT_VELOCITY_DAMKOEHLER``."""
    return laminar + fluctuation


def wall_gradient(velocity: float, diameter: float, kinematic_viscosity: float) -> float:
    """Return the velocity gradient at the wall of a smooth duct, 1/s.

    Parameters
    ----------
    velocity : float
        Mean [m/s]
    diameter : float
        Hydraulic [m]
    kinematic_viscosity : float
        [m2/s]

    Source
    ------
    ``WALL_GRADIENT``.
    """
    if velocity * diameter / kinematic_viscosity < TURBULENT_REYNOLDS:
        return 8.0 * velocity / diameter
    return 0.0396 * velocity**1.75 * kinematic_viscosity**-0.75 * diameter**-0.25


def critical_gradient(laminar: float, diffusivity: float, hydrogen_share: float) -> float:
    """Return the wall gradient at which a confined flame runs back, 1/s.

    Parameters
    ----------
    laminar : float
        Laminar burning velocity [m/s]
    diffusivity : float
        Thermal, of the unburnt mixture [m2/s]
    hydrogen_share : float
        Mole fraction in the fuel: blends lie between the two tube burners [-]

    Source
    ------
    ``CRITICAL_GRADIENT``.
    """
    number = GRADIENT_NUMBER * (1.0 - hydrogen_share) + GRADIENT_NUMBER_HYDROGEN * hydrogen_share
    return CONFINEMENT * number * laminar**2 / diffusivity


def core_factor(hydrogen_share: float) -> float:
    """Return the core velocity asked for over the turbulent burning velocity [-]."""
    return CORE_FACTOR + (CORE_FACTOR_HYDROGEN - CORE_FACTOR) * min(hydrogen_share, 1.0)


def hydrogen_speed_up(hydrogen_share: float) -> float:
    """Return the factor on the turbulent burning velocity [-]; source: ``HYDROGEN_SPEED_UP``."""
    return 1.0 + (PURE_HYDROGEN_SPEED_UP - 1.0) * min(hydrogen_share, 1.0)
