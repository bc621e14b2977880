"""Heating values of a mixture: ISO 6976 molar values where they exist, else the mechanism's."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files
from typing import Any

from combustor.base.method import Method
from combustor.fuel.composition import atoms_of_formula, mean_atoms, oxygen_demand
from combustor.fuel.gas import Gas

ISO_HEATING_VALUES = Method(
    key="heating-value-iso-6976",
    quantity="molar heating values of pure gases, mixed by mole fraction",
    source="ISO 6976:2016, ideal gas, 15 degC; table read in the public data file "
    "iso6976constants2016.csv of neqsim",
    reading="as given in",
    note="lower value of methane stands 0.005 % above higher minus water, as found",
)

MECHANISM_HEATING_VALUES = Method(
    key="heating-value-mechanism",
    quantity="molar heating value of a species from formation enthalpies",
    source="the reaction mechanism's own NASA polynomials at 15 degC",
    reading="computed",
    note="stands in for species that ISO 6976 data here do not cover",
)


@dataclass(frozen=True)
class MolarHeat:
    """Heat of complete combustion at 15 degC, J/mol; ``basis`` says where it comes from."""

    lower: float
    higher: float
    basis: str = ""


@cache
def _table() -> dict[str, Any]:
    text = files("combustor.fuel").joinpath("heating_values.toml").read_text(encoding="utf-8")
    return tomllib.loads(text)


def water_condensation() -> float:
    """Return the heat of condensing water at 15 degC, J/mol."""
    return 1e3 * float(_table()["water_condensation"])


def iso_molar_heat(species: str, atoms: Mapping[str, float]) -> MolarHeat | None:
    """Return the ISO 6976 heating values of a pure gas, or None when it is not covered.

    Parameters
    ----------
    species : str
        Name as a mechanism spells it, any letter case.
    atoms : mapping of str to float
        Guards against another species of the same name.

    Source
    ------
    ``ISO_HEATING_VALUES``.
    """
    for row in _table()["gas"]:
        if species.upper() in row["names"] and atoms_of_formula(row["formula"]) == dict(atoms):
            return MolarHeat(1e3 * row["lower"], 1e3 * row["higher"], _table()["source"])
    return None


def iso_heat_of(formula: str) -> MolarHeat:
    """Return the ISO 6976 heating values of a gas that the data here do hold.

    Raises
    ------
    KeyError
        The data do not hold it.
    """
    heat = iso_molar_heat(formula, atoms_of_formula(formula))
    if heat is None:
        raise KeyError(formula)
    return heat


def is_inert(atoms: Mapping[str, float]) -> bool:
    """Say whether a species gives no heat: N2, CO2, H2O, O2 and the noble gases."""
    burnt = ({"N": 2}, {"C": 1, "O": 2}, {"H": 2, "O": 1}, {"O": 2}, {"Ar": 1}, {"He": 1})
    return dict(atoms) in burnt


def atoms_in(gas: Gas, species: str) -> dict[str, float]:
    """Return the atoms of one species of a mechanism."""
    column = gas.element_matrix[:, gas.index(species)]
    return {
        element.capitalize(): float(count)
        for element, count in zip(gas.element_names, column, strict=True)
        if count != 0.0
    }


def mechanism_molar_heat(gas: Gas, species: str) -> MolarHeat:
    """Return the heating values of a pure species by the mechanism's thermodynamics.

    Source
    ------
    ``MECHANISM_HEATING_VALUES``.
    """
    place = gas.index(species)
    pure = gas.from_mole_fractions({species: 1.0})
    lower = gas.lower_heating_value(pure) * float(gas.molar_masses[place])
    water = 0.5 * atoms_in(gas, species).get("H", 0.0) * water_condensation()
    return MolarHeat(lower, lower + water, "the mechanism's thermodynamics at 15 degC")


def mixture_heat(gas: Gas, composition: Mapping[str, float]) -> MolarHeat:
    """Return the heating values of a mixture, by mole fraction.

    Water vapour in the fuel counts as condensed in the higher value, as in ISO 6976.

    Parameters
    ----------
    gas : Gas
        The mechanism, for species that ISO 6976 data do not cover.
    composition : mapping of str to float
        Mole fractions.
    """
    lower = higher = 0.0
    uncovered = []
    for species, share in composition.items():
        atoms = atoms_in(gas, species)
        if is_inert(atoms):
            water = 0.5 * atoms.get("H", 0.0) * water_condensation()
            heat = MolarHeat(0.0, water)
        else:
            found = iso_molar_heat(species, atoms)
            if found is None:
                uncovered.append(species)
            heat = found or mechanism_molar_heat(gas, species)
        lower += share * heat.lower
        higher += share * heat.higher
    basis = str(_table()["source"])
    if uncovered:
        basis += f", but {', '.join(uncovered)} by the mechanism's thermodynamics at 15 degC"
    return MolarHeat(lower, higher, basis)


def mixture_oxygen(gas: Gas, composition: Mapping[str, float]) -> tuple[dict[str, float], float]:
    """Return atoms per mean molecule, and mol O2 to burn one mol of the mixture."""
    atoms = mean_atoms(composition, {species: atoms_in(gas, species) for species in composition})
    return atoms, oxygen_demand(atoms)
