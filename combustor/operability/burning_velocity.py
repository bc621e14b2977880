"""Laminar burning velocity: the mechanism's own, a table of it, and a published correlation."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import lru_cache
from importlib import resources

import cantera as ct
import numpy as np
from numpy.typing import NDArray
from scipy.interpolate import PchipInterpolator, RegularGridInterpolator

from combustor.base.errors import InputError, NotConvergedError, Problem
from combustor.base.method import Method, Notice
from combustor.fuel.choose_mechanism import catalogue

ATMOSPHERE = 101325.0  # Pa

BURNING_VELOCITY_GULDER = Method(
    key="burning-velocity-gulder",
    quantity="laminar burning velocity",
    source="Guelder 1984, SAE 841000: W phi^eta exp(-xi (phi - 1.075)^2) (T/300)^a (P/atm)^b, "
    "(1 - 2.3 Y) for diluent Y",
    reading="as given in",
    validity={
        "equivalence_ratio": (0.6, 1.4),
        "temperature": (290.0, 600.0),
        "pressure": (101325.0, 1013250.0),
    },
    scatter="15 to 25 % at 600 K or 10 atm against kinetics",
)
BURNING_VELOCITY_KINETIC = Method(
    key="burning-velocity-kinetic",
    quantity="laminar burning velocity",
    source="freely propagating flame, mixture-averaged transport, GRI-Mech 3.0 without its "
    "nitrogen chemistry, dry air",
    reading="computed",
    validity={"pressure": (1333.0, 1013250.0)},
    scatter="2 % from the grid; GRI-Mech 3.0 gives propane 0.49 m/s where 0.41 to 0.44 is measured",
    note="fitted up to 10 atm; hydrogen flames stretched or wrinkled burn faster",
)
BURNING_VELOCITY_TABLE = Method(
    key="burning-velocity-table",
    quantity="laminar burning velocity of methane, hydrogen and their blends",
    source="180 flames computed as burning-velocity-kinetic; logarithms linear between them in "
    "logarithm of pressure and temperature, cubic in equivalence ratio, linear in hydrogen share",
    reading="computed",
    validity={
        "equivalence_ratio": (0.4, 1.0),
        "temperature": (500.0, 900.0),
        "pressure": (5e5, 2e6),
    },
    scatter="7 % low to 5 % high against ten flames between its nodes",
)

# W, eta, xi, temperature exponent, pressure exponent
_GULDER: Mapping[str, tuple[float, float, float, float, float]] = {
    "CH4": (0.422, 0.15, 5.18, 2.0, -0.5),
    "C3H8": (0.446, 0.12, 4.95, 1.77, -0.2),
}
_HYDROCARBONS = ("CH4", "C2H6", "C3H8")
_DILUENTS = ("N2", "CO2", "AR", "HE", "H2O")
MOST_DILUENT = 0.10  # of the fuel by mole that the table may stand in for without a word
FLAME_WIDTH, ATMOSPHERIC_WIDTH = 0.006, 0.03  # m


@dataclass(frozen=True)
class BurningVelocity:
    """A laminar burning velocity.

    Parameters
    ----------
    value : float
        [m/s]
    method : Method
    notices : tuple of Notice
    """

    value: float
    method: Method
    notices: tuple[Notice, ...] = ()


def burning_velocity_gulder(
    fuel: str,
    equivalence_ratio: float,
    temperature: float,
    pressure: float,
    diluent: float = 0.0,
) -> float:
    """Return the laminar burning velocity of methane or propane.

    Parameters
    ----------
    fuel : {"CH4", "C3H8"}
    equivalence_ratio : float
        [-]
    temperature, pressure : float
        Of the unburnt mixture [K], [Pa]
    diluent : float
        Burnt gas in the mixture, by mole [-]

    Returns
    -------
    float
        [m/s]

    Source
    ------
    ``BURNING_VELOCITY_GULDER``.
    """
    w, eta, xi, warm, press = _GULDER[fuel]
    shape = w * equivalence_ratio**eta * np.exp(-xi * (equivalence_ratio - 1.075) ** 2)
    conditions = (temperature / 300.0) ** warm * (pressure / ATMOSPHERE) ** press
    return float(shape * conditions * (1.0 - 2.3 * diluent))


def flame_velocity(
    composition: Mapping[str, float], equivalence_ratio: float, temperature: float, pressure: float
) -> BurningVelocity:
    """Solve a flat flame with the mechanism: several seconds the first time, then remembered.

    Parameters
    ----------
    composition : mapping of str to float
        Mole fractions of the fuel.
    equivalence_ratio : float
        [-]
    temperature, pressure : float
        Of the unburnt mixture, dry air [K], [Pa]

    Raises
    ------
    InputError
        A fuel GRI-Mech 3.0 does not hold.
    NotConvergedError
        No flame found, as beyond the flammable limits.
    """
    known = {name.upper() for name in _without_nitrogen_chemistry().species_names}
    strange = sorted(name for name in composition if name.upper() not in known)
    if strange:
        raise InputError(
            Problem(
                f"no burning velocity of {', '.join(strange)} here",
                "fuels of methane to propane, hydrogen, carbon monoxide, methanol and inerts",
                "--burning-velocity",
            )
        )
    parts = tuple(sorted((name, round(share, 6)) for name, share in composition.items() if share))
    value = _solved(
        parts, round(equivalence_ratio, 4), round(temperature, 1), float(f"{pressure:.4g}")
    )
    notices = BURNING_VELOCITY_KINETIC.notices(pressure=pressure)
    return BurningVelocity(value, BURNING_VELOCITY_KINETIC, notices)


@lru_cache(maxsize=256)
def _solved(
    parts: tuple[tuple[str, float], ...],
    equivalence_ratio: float,
    temperature: float,
    pressure: float,
) -> float:
    solution = _without_nitrogen_chemistry()
    solution.set_equivalence_ratio(
        equivalence_ratio, dict(parts), "O2:0.2095, N2:0.7808, AR:0.0093, CO2:0.0004"
    )
    solution.TP = temperature, pressure
    flame = ct.FreeFlame(solution, width=ATMOSPHERIC_WIDTH if pressure < 2e5 else FLAME_WIDTH)
    flame.set_refine_criteria(ratio=4, slope=0.1, curve=0.2)
    try:
        flame.solve(loglevel=0, auto=True)
    except ct.CanteraError as error:
        raise NotConvergedError(
            f"no flat flame found at equivalence ratio {equivalence_ratio:g}, {temperature:g} K "
            f"and {pressure:g} Pa: it may lie beyond the flammable limits"
        ) from error
    return float(flame.velocity[0])


@lru_cache(maxsize=1)
def _without_nitrogen_chemistry() -> ct.Solution:
    path = next(m.path for m in catalogue() if m.file == "gri30.yaml")
    whole = ct.Solution(str(path))
    species = [s for s in whole.species() if "N" not in s.composition or s.name == "N2"]
    names = {s.name for s in species}
    reactions = [r for r in whole.reactions() if {*r.reactants, *r.products} <= names]
    return ct.Solution(
        thermo="ideal-gas",
        kinetics="gas",
        transport_model="mixture-averaged",
        species=species,
        reactions=reactions,
    )


def tabulated(
    composition: Mapping[str, float], equivalence_ratio: float, temperature: float, pressure: float
) -> BurningVelocity | None:
    """Return the burning velocity from the table, or None for a fuel it cannot stand for.

    Hydrocarbons up to propane count as methane, as long as methane is most of them.

    Parameters
    ----------
    composition : mapping of str to float
        Mole fractions of the fuel.
    equivalence_ratio : float
        [-]
    temperature, pressure : float
        Of the unburnt mixture [K], [Pa]
    """
    shares = {name.upper(): share for name, share in composition.items()}
    hydrogen = shares.get("H2", 0.0)
    carbon = sum(shares.get(name, 0.0) for name in _HYDROCARBONS)
    inert = sum(shares.get(name, 0.0) for name in _DILUENTS)
    if hydrogen + carbon + inert < 0.999 or inert > MOST_DILUENT:
        return None
    if carbon > 0.0 and shares.get("CH4", 0.0) < 0.8 * carbon:
        return None
    table = _table()
    share = hydrogen / (hydrogen + carbon)
    value = table.at(share, pressure, temperature, equivalence_ratio)
    notices = BURNING_VELOCITY_TABLE.notices(
        equivalence_ratio=equivalence_ratio, temperature=temperature, pressure=pressure
    )
    return BurningVelocity(value * table.beyond(pressure), BURNING_VELOCITY_TABLE, notices)


@dataclass(frozen=True, eq=False)
class _Table:
    pressures: NDArray[np.float64]
    temperatures: NDArray[np.float64]
    ratios: NDArray[np.float64]
    logarithms: RegularGridInterpolator

    def at(self, share: float, pressure: float, temperature: float, ratio: float) -> float:
        """Return the velocity at a place, at the nearest edge of the table where it is outside."""
        count = len(self.ratios)
        places = np.empty((count, 4))
        places[:, 0] = share
        places[:, 1] = np.log(np.clip(pressure, *self.pressures[[0, -1]]))
        places[:, 2] = np.log(np.clip(temperature, *self.temperatures[[0, -1]]))
        places[:, 3] = self.ratios
        along = PchipInterpolator(self.ratios, self.logarithms(places))
        return float(np.exp(along(np.clip(ratio, *self.ratios[[0, -1]]))))

    def beyond(self, pressure: float) -> float:
        """Return the factor outside the table's pressures: the usual inverse root."""
        inside = float(np.clip(pressure, self.pressures[0], self.pressures[-1]))
        return (inside / pressure) ** 0.5


@lru_cache(maxsize=1)
def _table() -> _Table:
    text = (resources.files("combustor.operability") / "burning_velocity.toml").read_text("utf-8")
    data = tomllib.loads(text)
    shares, pressures, temperatures, ratios = (
        np.array(data[key], dtype=float)
        for key in ("hydrogen_share", "pressure", "temperature", "equivalence_ratio")
    )
    values = np.log(np.array(data["velocity"], dtype=float)).reshape(
        len(shares), len(pressures), len(temperatures), len(ratios)
    )
    axes = (shares, np.log(pressures), np.log(temperatures), ratios)
    return _Table(pressures, temperatures, ratios, RegularGridInterpolator(axes, values))
