"""Thermodynamics of a lumped fuel species, and the pure substances that are lumped whole."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache

import cantera as ct
import numpy as np

from combustor.base.method import Method
from combustor.fuel.composition import ATOMIC_MASS, molar_mass

R = 8.314462618  # J/mol/K
STANDARD = 288.15  # K
NASA_FILE = "nasa_gas.yaml"

LUMPED_HEAT_CAPACITY = Method(
    key="lumped-heat-capacity",
    quantity="heat capacity and entropy of a fuel's vapour, per mass, by its hydrogen content",
    source="toluene, Jet-A(g) and n-octane of the NASA data (McBride, Gordon and Reno 1993) in "
    "the file that ships with Cantera, linear in hydrogen by mass between them",
    reading="computed",
    validity={"hydrogen": (0.0875, 0.1588), "temperature": (273.0, 3000.0)},
    scatter="2 % between the hydrocarbons of one hydrogen content; 10 % for oxygenates",
)
LUMPED_FORMATION = Method(
    key="lumped-formation-enthalpy",
    quantity="enthalpy of formation of a lumped fuel's vapour",
    source="stated net heating value of the liquid plus latent heat, complete combustion at "
    "15 degC to CO2, H2O and N2 of the mechanism",
    reading="derived",
)

ANCHORS = ("C7H8", "Jet-A(g)", "C8H18,n-octane")  # rising hydrogen content


@dataclass(frozen=True)
class Polynomials:
    """Two NASA polynomials of seven terms and the temperatures that bound them, K."""

    ranges: tuple[float, float, float]
    low: tuple[float, ...]
    high: tuple[float, ...]

    def enthalpy(self, temperature: float) -> float:
        """Return the molar enthalpy, J/mol."""
        a = self.low if temperature < self.ranges[1] else self.high
        powers = [temperature**k / (k + 1) for k in range(5)]
        terms = sum(c * p for c, p in zip(a[:5], powers, strict=True))
        return R * (temperature * terms + a[5])

    def heat_capacity(self, temperature: float) -> float:
        """Return the molar heat capacity, J/(mol K)."""
        a = self.low if temperature < self.ranges[1] else self.high
        return R * sum(c * temperature**k for k, c in enumerate(a[:5]))

    def shifted(self, enthalpy: float) -> Polynomials:
        """Return them with an enthalpy added everywhere, J/mol."""
        more = enthalpy / R
        return Polynomials(
            self.ranges,
            (*self.low[:5], self.low[5] + more, self.low[6]),
            (*self.high[:5], self.high[5] + more, self.high[6]),
        )


@cache
def _nasa() -> Mapping[str, ct.Species]:
    return {species.name: species for species in ct.Species.list_from_file(NASA_FILE)}


def pure(name: str) -> tuple[dict[str, float], Polynomials]:
    """Return atoms and polynomials of a substance of the NASA data, named as there."""
    species = _nasa()[name]
    thermo = species.thermo
    middle, *coefficients = thermo.coeffs.tolist()
    ranges = (float(thermo.min_temp), float(middle), float(thermo.max_temp))
    found = Polynomials(ranges, tuple(coefficients[7:]), tuple(coefficients[:7]))
    return {element.capitalize(): count for element, count in species.composition.items()}, found


def vapour_of(atoms: Mapping[str, float], lower_heat: float) -> Polynomials:
    """Return the polynomials of a lumped fuel's vapour.

    Parameters
    ----------
    atoms : mapping of str to float
    lower_heat : float
        Heat of complete combustion of the vapour at 15 degC, J/mol.

    Source
    ------
    ``LUMPED_HEAT_CAPACITY``, ``LUMPED_FORMATION``.
    """
    mass = molar_mass(atoms)
    hydrogen = atoms["H"] * ATOMIC_MASS["H"] / mass
    rows, contents, ranges = [], [], []
    for name in ANCHORS:
        its_atoms, its = pure(name)
        its_mass = molar_mass(its_atoms)
        rows.append(np.array([its.low, its.high]) * mass / its_mass)
        contents.append(its_atoms["H"] * ATOMIC_MASS["H"] / its_mass)
        ranges.append(its.ranges)
    weights = [float(np.interp(hydrogen, contents, row)) for row in np.eye(len(ANCHORS))]
    mixed = sum((w * row for w, row in zip(weights, rows, strict=True)), np.zeros((2, 7)))
    middle = ranges[0][1]
    bounds = (max(r[0] for r in ranges), middle, min(r[2] for r in ranges))
    vapour = Polynomials(bounds, tuple(mixed[0].tolist()), tuple(mixed[1].tolist()))
    return vapour.shifted(lower_heat + _burnt(atoms) - vapour.enthalpy(STANDARD))


def _burnt(atoms: Mapping[str, float]) -> float:
    """Return the enthalpy of the complete products less that of the oxygen, J/mol, by GRI-Mech."""
    enthalpy = {name: _base(name).enthalpy(STANDARD) for name in ("CO2", "H2O", "N2", "O2")}
    carbon, hydrogen = atoms.get("C", 0.0), atoms.get("H", 0.0)
    oxygen = carbon + 0.25 * hydrogen - 0.5 * atoms.get("O", 0.0)
    products = carbon * enthalpy["CO2"] + 0.5 * hydrogen * enthalpy["H2O"]
    return products + 0.5 * atoms.get("N", 0.0) * enthalpy["N2"] - oxygen * enthalpy["O2"]


@cache
def _base(name: str) -> Polynomials:
    for species in ct.Species.list_from_file("gri30.yaml"):
        if species.name == name:
            thermo = species.thermo
            middle, *c = thermo.coeffs.tolist()
            ranges = (float(thermo.min_temp), float(middle), float(thermo.max_temp))
            return Polynomials(ranges, tuple(c[7:]), tuple(c[:7]))
    raise KeyError(name)
