"""NOx and CO along the axis, on the reporting basis."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from combustor.emissions import bases
from combustor.emissions.unburnt import MAXIMUM_DRY_OXYGEN, RICH
from combustor.fuel.composition import oxygen_demand
from combustor.fuel.gas import Array, Gas
from combustor.fuel.heating_value import atoms_in


@dataclass(frozen=True)
class DryProfile:
    """Mole fractions, dry, at 15 % O2, one a station; nan where that basis is undefined."""

    nox: Array
    co: Array


def dry_15_along(gas: Gas, mass_fractions: Array) -> DryProfile:
    """Return NOx and CO at every station.

    Parameters
    ----------
    gas : Gas
        The mechanism.
    mass_fractions : ndarray
        One row a station.

    Returns
    -------
    DryProfile
        nan where the gas is rich, its dry O2 is above 20 %, or (NOx) the mechanism has no NO.
    """
    moles = np.atleast_2d(mass_fractions) / gas.molar_masses
    fractions = moles / moles.sum(axis=1, keepdims=True)
    demand = np.array([oxygen_demand(atoms_in(gas, name)) for name in gas.species_names])
    water = _column(gas, fractions, "H2O")
    oxygen = bases.dry(_column(gas, fractions, "O2"), water)
    defined = (oxygen <= MAXIMUM_DRY_OXYGEN) & (-(fractions @ demand) >= RICH)
    usable = np.where(defined, oxygen, 0.0)

    def at_15(species: Array) -> Array:
        value = bases.at_reference_oxygen(bases.dry(species, water), usable)
        return np.where(defined, value, np.nan)

    nox = _column(gas, fractions, "NO") + _column(gas, fractions, "NO2")
    if not gas.has("NO"):
        nox = np.full_like(nox, np.nan)
    return DryProfile(nox=at_15(nox), co=at_15(_column(gas, fractions, "CO")))


def _column(gas: Gas, fractions: Array, species: str) -> Array:
    if not gas.has(species):
        return np.zeros(len(fractions))
    return np.asarray(fractions[:, gas.index(species)])
