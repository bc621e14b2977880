"""What would close the gap to a limit, and by roughly how much."""

from __future__ import annotations

from dataclasses import dataclass
from math import log, sqrt

from combustor.base.method import Method

THERMAL_NO = Method(
    key="thermal-no-sensitivity",
    quantity="change of thermal NO with temperature and time",
    source="Zeldovich 1946 with O atoms in equilibrium: rate over exp(-69090 K / T), linear in "
    "time far from equilibrium",
    reading="from memory",
    note="prompt and N2O routes answer less; below about 1800 K it overstates the answer",
)
WATER_INJECTION = Method(
    key="water-injection-nox",
    quantity="NOx with water over NOx without, conventional diffusion flame",
    source="exp(-(0.2 X^2 + 1.41 X)), X water over fuel by mass (Lefebvre 1983, after Toof)",
    reading="from memory",
    validity={"water_fuel_ratio": (0.0, 1.2)},
    scatter="15 points of reduction: 40 % is also quoted at X = 0.5 where this gives 53 %",
)
CO_BURNOUT = Method(
    key="co-temperature-lefebvre",
    quantity="change of CO with primary-zone temperature and volume",
    source="Lefebvre 1984, EI_CO over exp(-0.00345 T) / volume",
    reading="from memory",
    scatter="factor 2",
)
PREMIXED_PRACTICE = Method(
    key="lean-premixed-practice",
    quantity="NOx of lean premixed front ends on natural gas",
    source="9 to 25 ppm dry at 15 % O2 in service",
    reading="common practice, no source",
)

_TAYLOR = 69090.0  # K
_MOST_WATER = 1.2
_LEAN = 0.75
_MOST_HEAT = 400.0  # K: beyond it the law is not the same flame
_LEAST_TIME = 0.3


@dataclass(frozen=True)
class Remedy:
    """One way to close a gap.

    Parameters
    ----------
    what : str
        The lever.
    change : str
        Roughly how much of it.
    note : str
        Where the figure comes from and what it costs.
    """

    what: str
    change: str
    note: str


@dataclass(frozen=True)
class Flame:
    """What of a rated point the levers act on.

    Parameters
    ----------
    temperature : float
        At the end of the primary zone, K.
    residence_time : float
        Of the primary zone, s.
    equivalence_ratio : float
        Of the primary zone.
    front_end : str
    unmixedness_elasticity : float or None
        d ln NOx / d ln unmixedness from a second rating; None where it was not run.
    water_elasticity : float or None
        d ln NOx / d (water over fuel) from a second rating.
    """

    temperature: float
    residence_time: float
    equivalence_ratio: float
    front_end: str
    unmixedness_elasticity: float | None = None
    water_elasticity: float | None = None


def remedies(pollutant: str, factor: float, flame: Flame) -> tuple[Remedy, ...]:
    """Return what would bring an emission down to ``factor`` of what it is.

    Parameters
    ----------
    pollutant : str
    factor : float
        Wanted over predicted, below 1.
    flame : Flame

    Source
    ------
    ``THERMAL_NO``, ``WATER_INJECTION``, ``CO_BURNOUT``, ``PREMIXED_PRACTICE``.
    """
    if pollutant in ("NOx", "NO", "NO2"):
        return _nox(factor, flame)
    if pollutant in ("CO", "UHC"):
        return _unburnt(factor, flame)
    if pollutant in ("SO2", "SO3"):
        cut = f"{100 * (1 - factor):.0f} % less sulfur in the fuel"
        return (Remedy("fuel sulfur", cut, "mass balance"),)
    if pollutant == "CO2":
        cut = f"{100 * (1 - factor):.0f} % less carbon per output"
        return (Remedy("carbon of the fuel, or efficiency", cut, "mass balance"),)
    return ()


def _nox(factor: float, flame: Flame) -> tuple[Remedy, ...]:
    colder = flame.temperature**2 / _TAYLOR * log(1.0 / factor)
    found = [
        Remedy(
            "flame temperature",
            f"about {colder:.0f} K colder where NO forms (now {flame.temperature:.0f} K)",
            "thermal NO alone; leaner or richer primary zone",
        ),
        Remedy(
            "residence time",
            f"from {1e3 * flame.residence_time:.2f} to about "
            f"{1e3 * flame.residence_time * factor:.2f} ms hot",
            "thermal NO far from equilibrium; CO rises",
        ),
        _mixing(factor, flame),
        _injection(factor, flame),
    ]
    if flame.front_end == "diffusion":
        found.append(
            Remedy(
                "staging",
                "a lean premixed or rich-lean front end",
                "lean premixed runs at 9 to 25 ppm on natural gas (common practice)",
            )
        )
    return tuple(found)


def _mixing(factor: float, flame: Flame) -> Remedy:
    slope = flame.unmixedness_elasticity
    if slope is None:
        toward = "lower" if flame.equivalence_ratio < _LEAN else "no help near stoichiometric"
        return Remedy("unmixedness", toward, "direction only: not rated a second time")
    if abs(slope) < 0.05:
        return Remedy("unmixedness", "no lever here", f"NOx moves with its power {slope:+.2f}")
    wanted = factor ** (1.0 / slope)
    if not 0.2 <= wanted <= 3.0:
        change = "not by this alone"
    else:
        change = f"about {wanted:.2f} times what it is"
    return Remedy("unmixedness", change, f"second rating: NOx moves with its power {slope:+.2f}")


def _injection(factor: float, flame: Flame) -> Remedy:
    # 0.2 X^2 + 1.41 X = ln(1/factor)
    more = log(1.0 / factor)
    ratio = (-1.41 + sqrt(1.41**2 + 0.8 * more)) / 0.4
    if flame.front_end != "diffusion":
        return Remedy("water injection", "not for this front end", "written for diffusion flames")
    note = "correlation, 15 points either way; CO rises steeply above about 1"
    if flame.water_elasticity is not None and flame.water_elasticity < -0.1:
        own = more / -flame.water_elasticity
        note = f"{own:.2f} by a second rating with water; {note}"
    if ratio > _MOST_WATER:
        return Remedy("water injection", f"not alone: more than {_MOST_WATER} of the fuel", note)
    return Remedy("water injection", f"about {ratio:.2f} kg per kg fuel more", note)


def _unburnt(factor: float, flame: Flame) -> tuple[Remedy, ...]:
    hotter = log(1.0 / factor) / 0.00345
    heat = f"about {hotter:.0f} K hotter (now {flame.temperature:.0f} K)"
    longer = 1e3 * flame.residence_time / factor
    time = f"from {1e3 * flame.residence_time:.2f} to about {longer:.2f} ms"
    return (
        Remedy(
            "flame temperature",
            heat if hotter <= _MOST_HEAT else f"not alone: more than {_MOST_HEAT:.0f} K hotter",
            "primary zone nearer to stoichiometric at this load; NOx rises",
        ),
        Remedy(
            "residence time",
            time if factor >= _LEAST_TIME else f"not alone: {1.0 / factor:.0f} times longer",
            "more volume, or less air before the secondary row",
        ),
        Remedy("film air", "less of it in the primary zone", "film air quenches CO at the wall"),
        Remedy("staging", "fewer injectors fed at this load", "each then burns nearer its design"),
    )
