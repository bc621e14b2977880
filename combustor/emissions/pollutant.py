"""What is counted in an exhaust, and as which substance its mass is stated."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from difflib import get_close_matches

from combustor.base.errors import InputError, Problem
from combustor.emissions import bases
from combustor.fuel.composition import atoms_of_formula, molar_mass


@dataclass(frozen=True)
class Pollutant:
    """One pollutant.

    Parameters
    ----------
    name : str
        As printed.
    counted_as : str
        Formula as which its mass is stated.
    parts : tuple of str
        Species of the exhaust that are added by mole to give it.
    """

    name: str
    counted_as: str
    parts: tuple[str, ...]

    @property
    def molar_mass(self) -> float:
        """Molar mass as which it is counted, kg/mol."""
        return mass_of(self.counted_as)


_MASSES = {
    "NO2": bases.NO2_MOLAR_MASS,
    "NO": bases.NO_MOLAR_MASS,
    "CO": bases.CO_MOLAR_MASS,
    "CH4": bases.CH4_MOLAR_MASS,
    "N2O": bases.N2O_MOLAR_MASS,
    "NH3": bases.NH3_MOLAR_MASS,
}


def mass_of(formula: str) -> float:
    """Return the molar mass of a substance, kg/mol."""
    return _MASSES.get(formula) or molar_mass(atoms_of_formula(formula))


POLLUTANTS: Mapping[str, Pollutant] = {
    p.name: p
    for p in (
        Pollutant("NOx", "NO2", ("NO", "NO2")),
        Pollutant("NO", "NO", ("NO",)),
        Pollutant("NO2", "NO2", ("NO2",)),
        Pollutant("CO", "CO", ("CO",)),
        Pollutant("UHC", "CH4", ("UHC",)),
        Pollutant("N2O", "N2O", ("N2O",)),
        Pollutant("NH3", "NH3", ("NH3",)),
        Pollutant("SO2", "SO2", ("SO2",)),
        Pollutant("SO3", "SO3", ("SO3",)),
        Pollutant("CO2", "CO2", ("CO2",)),
    )
}

# named by rules, but nothing in this package predicts them
NOT_PREDICTED = ("dust", "smoke number", "nvPM", "formaldehyde", "VOC", "PM")

_SYNONYMS = {"hc": "UHC", "thc": "UHC", "particulate matter": "PM", "ammonia": "NH3"}


def find(name: str) -> Pollutant:
    """Return a pollutant by name, whatever the letter case.

    Raises
    ------
    InputError
        Not known, or known and not predicted here.
    """
    known = {key.lower(): key for key in POLLUTANTS}
    key = _SYNONYMS.get(name.lower(), known.get(name.lower()))
    if key is not None and key in POLLUTANTS:
        return POLLUTANTS[key]
    close = get_close_matches(name.lower(), known, n=1)
    raise InputError(
        Problem(
            "no such pollutant",
            f"choose from {', '.join(POLLUTANTS)}",
            "species",
            name,
            nearest=known[close[0]] if close else None,
        )
    )
