"""Atoms, oxygen demand and stoichiometric fuel-air ratio of a mixture; checks of mole fractions."""

from __future__ import annotations

import re
from collections.abc import Mapping
from math import isfinite

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.gas import DRY_AIR

# kg/mol, IUPAC conventional values
ATOMIC_MASS: Mapping[str, float] = {
    "H": 1.008e-3,
    "C": 12.011e-3,
    "N": 14.007e-3,
    "O": 15.999e-3,
    "S": 32.06e-3,
    "Ar": 39.95e-3,
    "He": 4.002602e-3,
}

# mol O2 taken up by one mol of atoms: to CO2, H2O, SO2 and N2
OXYGEN_PER_ATOM: Mapping[str, float] = {
    "C": 1.0,
    "H": 0.25,
    "S": 1.0,
    "O": -0.5,
    "N": 0.0,
    "Ar": 0.0,
    "He": 0.0,
}

SUM_TOLERANCE = 1e-3  # chromatograph rows are printed to 0.01 %, so sums miss 1 by a few 1e-4

STOICHIOMETRY = Method(
    key="stoichiometric-fuel-air-ratio",
    quantity="fuel-air ratio of complete combustion, per dry air",
    source="element balance: C to CO2, H to H2O, S to SO2, N to N2; dry air with 20.95 % O2",
    reading="derived",
)


def atoms_of_formula(formula: str) -> dict[str, int]:
    """Return the atoms of a plain chemical formula such as ``"CH3OH"`` or ``"C12H26"``.

    Raises
    ------
    InputError
        The text is not a formula in C, H, O, N, S, Ar and He.
    """
    atoms: dict[str, int] = {}
    parts = re.findall(r"(Ar|He|[CHONS])(\d*)", formula)
    if not parts or "".join(symbol + count for symbol, count in parts) != formula:
        raise InputError(
            Problem(
                "not a chemical formula",
                key="formula",
                value=formula,
                allowed="write C, H, O, N, S, Ar, He with counts, e.g. CH3OH",
            )
        )
    for symbol, count in parts:
        atoms[symbol] = atoms.get(symbol, 0) + int(count or 1)
    return atoms


def mean_atoms(
    composition: Mapping[str, float], atoms: Mapping[str, Mapping[str, float]]
) -> dict[str, float]:
    """Return atoms of each element per mean molecule.

    Parameters
    ----------
    composition : mapping of str to float
        Mole fractions.
    atoms : mapping of str to mapping
        Atoms of each species in ``composition``.
    """
    mean: dict[str, float] = {}
    for species, share in composition.items():
        for element, count in atoms[species].items():
            mean[element] = mean.get(element, 0.0) + share * count
    return mean


def molar_mass(atoms: Mapping[str, float]) -> float:
    """Return the molar mass of a molecule (or mean molecule) from its atoms, kg/mol."""
    return sum(count * ATOMIC_MASS[element] for element, count in atoms.items())


def oxygen_demand(atoms: Mapping[str, float]) -> float:
    """Return mol O2 that burn one mol of a (mean) molecule completely.

    Negative for an oxidiser, zero for an inert gas.

    Raises
    ------
    InputError
        An element whose combustion product is not defined here.
    """
    unknown = sorted(element for element in atoms if element not in OXYGEN_PER_ATOM)
    if unknown:
        raise InputError(
            Problem(
                f"no complete combustion is defined for {', '.join(unknown)}",
                key="composition",
                allowed=f"fuels are made of {', '.join(OXYGEN_PER_ATOM)}",
            )
        )
    return sum(count * OXYGEN_PER_ATOM[element] for element, count in atoms.items())


def dry_air_molar_mass() -> float:
    """Return the molar mass of the dry air used everywhere in this package, kg/mol."""
    formula = {"AR": "Ar"}
    return sum(
        share * molar_mass(atoms_of_formula(formula.get(species, species)))
        for species, share in DRY_AIR.items()
    )


def stoichiometric_fuel_air_ratio(fuel_molar_mass: float, oxygen: float) -> float:
    """Return kg fuel per kg DRY air at complete combustion.

    Parameters
    ----------
    fuel_molar_mass : float
        kg/mol.
    oxygen : float
        mol O2 per mol fuel, above zero.

    Source
    ------
    ``STOICHIOMETRY``.
    """
    air_moles = oxygen / DRY_AIR["O2"]
    return fuel_molar_mass / (air_moles * dry_air_molar_mass())


def checked(composition: Mapping[str, float]) -> tuple[dict[str, float], tuple[str, ...]]:
    """Return mole fractions that sum to 1 exactly, and what was done to get there.

    Entries that are zero are dropped. A sum off 1 by no more than ``SUM_TOLERANCE`` is
    scaled, and that is said.

    Raises
    ------
    InputError
        Every entry that is no fraction, and a sum that is not 1.
    """
    problems = [
        Problem(
            "not a mole fraction",
            key=f"composition.{species}",
            value=share,
            allowed="give a number between 0 and 1",
        )
        for species, share in composition.items()
        if not (isfinite(share) and 0.0 <= share <= 1.0)
    ]
    total = sum(composition.values())
    if not composition:
        problems.append(
            Problem("empty", key="composition", allowed="give mole fractions that sum to 1")
        )
    elif isfinite(total) and abs(total - 1.0) > SUM_TOLERANCE:
        percent = abs(total - 100.0) <= 100.0 * SUM_TOLERANCE
        if percent:  # then every single entry would be named as well, to no use
            problems = []
        problems.append(
            Problem(
                "mole fractions do not sum to 1",
                key="composition",
                value=float(f"{total:.6g}"),
                allowed="these look like percent: divide by 100"
                if percent
                else f"the sum must lie within {SUM_TOLERANCE:g} of 1",
            )
        )
    if problems:
        raise InputError(problems)
    fractions = {species: share / total for species, share in composition.items() if share > 0.0}
    if abs(total - 1.0) > 1e-9:
        return fractions, (f"mole fractions summed to {total:.5f} and were scaled to 1",)
    return fractions, ()
