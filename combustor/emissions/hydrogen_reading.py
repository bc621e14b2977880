"""Why hydrogen reads high in ppm: the same NOx per heat in a thinner dry gas."""

from __future__ import annotations

from collections.abc import Mapping

from combustor.base.method import Method
from combustor.emissions.bases import OXYGEN_IN_AIR, dry_exhaust_per_fuel
from combustor.emissions.fuel_factor import dry_products
from combustor.fuel.composition import oxygen_demand
from combustor.fuel.heating_value import iso_heat_of

APPARENT_PENALTY = Method(
    key="hydrogen-apparent-ppm",
    quantity="dry concentration at a reference O2 over that of methane, at equal mass per heat",
    source="dry stoichiometric gas per lower heating value of methane over the fuel's",
    reading="derived",
    note="UK regulators print 1.37 for pure hydrogen against natural gas (October 2024 guidance, "
    "read there)",
)

_METHANE = {"C": 1.0, "H": 4.0}


def dry_gas_per_heat(atoms: Mapping[str, float], molar_heat: float) -> float:
    """Return mol of dry stoichiometric exhaust per J, from atoms and J per mol of fuel."""
    return (
        dry_exhaust_per_fuel(oxygen_demand(atoms), dry_products(atoms), 0.0, OXYGEN_IN_AIR)
        / molar_heat
    )


def apparent_factor(atoms: Mapping[str, float], molar_heat: float) -> float:
    """Return by what the same mass per lower heat reads higher than on methane.

    Parameters
    ----------
    atoms : mapping of str to float
        Per mean molecule.
    molar_heat : float
        Lower heating value, J/mol.

    Source
    ------
    ``APPARENT_PENALTY``.
    """
    methane = dry_gas_per_heat(_METHANE, iso_heat_of("CH4").lower)
    return methane / dry_gas_per_heat(atoms, molar_heat)


def hydrogen_limit_factor(atoms: Mapping[str, float], molar_heat: float, pure: float) -> float:
    """Return the factor on a limit for natural gas, scaled to a rule's figure for pure hydrogen.

    Parameters
    ----------
    atoms, molar_heat : mapping, float
        Of the fuel, as for `apparent_factor`.
    pure : float
        The rule's factor at 100 % hydrogen.
    """
    full = apparent_factor({"H": 2.0}, iso_heat_of("H2").lower)
    share = (apparent_factor(atoms, molar_heat) - 1.0) / (full - 1.0)
    return 1.0 + max(share, 0.0) * (pure - 1.0)
