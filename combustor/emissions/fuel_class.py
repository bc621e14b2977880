"""Which class of the rules a fuel falls into, and how much of its heat is natural gas."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.base.errors import InputError
from combustor.base.method import Method
from combustor.fuel.composition import atoms_of_formula, oxygen_demand
from combustor.fuel.heating_value import iso_molar_heat

NATURAL_GAS = Method(
    key="natural-gas-class",
    quantity="whether a gas counts as natural gas",
    source="40 CFR 60.4420 (at least 70 % methane by volume) and directive 2010/75/EU article 3 "
    "(at most 20 % inerts)",
    reading="from memory",
    note="judged on the part of the fuel that is not hydrogen, carbon monoxide or ammonia",
)
LEAST_METHANE = 0.70
MOST_INERT = 0.20
WHOLLY = 0.98  # of the heat: hydrogen below this share is a trace of the pipeline

_NOT_HYDROCARBON: Mapping[str, Mapping[str, float]] = {
    "H2": {"H": 2},
    "CO": {"C": 1, "O": 1},
    "NH3": {"N": 1, "H": 3},
}
_INERT = ("N2", "CO2", "AR", "HE", "H2O", "O2")
_DISTILLATES = ("jet", "kerosene", "kerosine", "diesel", "gas-oil", "fuel-oil", "distillate")


@dataclass(frozen=True)
class FuelStanding:
    """How the rules see a fuel.

    Parameters
    ----------
    fuel_class : {"natural-gas", "other-gas", "gas-oil", "other-liquid"}
    natural_gas_share : float
        Of the lower heat.
    hydrogen_share : float
        Mole fraction of H2 in the fuel.
    """

    fuel_class: str
    natural_gas_share: float
    hydrogen_share: float


def standing(name: str, phase: str, composition: Mapping[str, float]) -> FuelStanding:
    """Return how the rules see a fuel.

    Parameters
    ----------
    name : str
        Tells distillates from other liquids.
    phase : {"gas", "liquid"}
    composition : mapping of str to float
        Mole fractions; of no weight for a liquid.

    Source
    ------
    ``NATURAL_GAS``.
    """
    by_name = {species.upper(): share for species, share in composition.items()}
    hydrogen = by_name.get("H2", 0.0) if phase == "gas" else 0.0
    if phase == "liquid" or "CH3OH" in by_name or "C2H5OH" in by_name:
        distillate = any(word in name.lower() for word in _DISTILLATES)
        return FuelStanding("gas-oil" if distillate else "other-liquid", 0.0, hydrogen)
    other_heat = sum(
        by_name.get(species, 0.0) * _heat(species, atoms)
        for species, atoms in _NOT_HYDROCARBON.items()
    )
    gas = {s: x for s, x in by_name.items() if s not in _NOT_HYDROCARBON}
    total = sum(gas.values())
    if total <= 0.0:
        return FuelStanding("other-gas", 0.0, hydrogen)
    inert = sum(gas.get(species, 0.0) for species in _INERT) / total
    methane = gas.get("CH4", 0.0) / total
    if methane < LEAST_METHANE or inert > MOST_INERT:
        return FuelStanding("other-gas", 0.0, hydrogen)
    hydrocarbon_heat = sum(
        share * _hydrocarbon_heat(species)
        for species, share in gas.items()
        if species not in _INERT
    )
    share = hydrocarbon_heat / (hydrocarbon_heat + other_heat)
    return FuelStanding("natural-gas" if share >= WHOLLY else "other-gas", share, hydrogen)


def _heat(species: str, atoms: Mapping[str, float]) -> float:
    found = iso_molar_heat(species, atoms)
    return 0.0 if found is None else found.lower


def _hydrocarbon_heat(species: str) -> float:
    try:
        atoms = atoms_of_formula(species)
    except InputError:
        return 0.0
    found = iso_molar_heat(species, atoms)
    # 400 kJ per mol O2 holds for hydrocarbons within 5 %
    return found.lower if found is not None else 4.0e5 * oxygen_demand(atoms)
