"""What is left unburnt in a gas: oxygen balance, hydrocarbons as methane, chemical heat."""

from __future__ import annotations

from collections.abc import Mapping

from combustor.base.method import Method
from combustor.emissions.bases import CH4_MOLAR_MASS, CO_MOLAR_MASS
from combustor.fuel.composition import oxygen_demand
from combustor.fuel.heating_value import iso_heat_of

MAXIMUM_DRY_OXYGEN = 0.20  # above it a correction to 15 % O2 multiplies noise
RICH = -1e-9  # mole fraction of missing O2 below which a gas counts as rich

COMBUSTION_EFFICIENCY = Method(
    key="combustion-efficiency-loss",
    quantity="combustion efficiency",
    source="1 - chemical heat left in the exhaust / fuel heat; CO, H2, NH3 and hydrocarbons "
    "(as CH4 by carbon) at their lower heating values at 15 degC",
    reading="derived",
    note="unburnt fuel other than methane counts at methane's heat per carbon, not at its own",
)


def oxygen_surplus(
    mole_fractions: Mapping[str, float], species_atoms: Mapping[str, Mapping[str, float]]
) -> float:
    """Return mol O2 left per mol gas after everything in it were burnt; negative when rich."""
    return -sum(
        share * oxygen_demand(species_atoms[species]) for species, share in mole_fractions.items()
    )


def has_reference(
    mole_fractions: Mapping[str, float],
    species_atoms: Mapping[str, Mapping[str, float]],
    o2_dry: float,
) -> bool:
    """Say whether a correction to 15 % O2 is defined: not rich, dry O2 not above 20 %."""
    return o2_dry <= MAXIMUM_DRY_OXYGEN and oxygen_surplus(mole_fractions, species_atoms) >= RICH


def methane_equivalent(
    mole_fractions: Mapping[str, float], species_atoms: Mapping[str, Mapping[str, float]]
) -> float:
    """Return the mole fraction of CH4 that holds the carbon of all hydrocarbons."""
    return sum(
        share * species_atoms[species]["C"]
        for species, share in mole_fractions.items()
        if is_hydrocarbon(species_atoms[species])
    )


def is_hydrocarbon(atoms: Mapping[str, float]) -> bool:
    """Say whether a species counts as unburnt hydrocarbon, aldehydes and alcohols included."""
    return "C" in atoms and "H" in atoms and "N" not in atoms


def heat_left(gas: Mapping[str, float], methane: float) -> float:
    """Return the chemical heat left in a gas, J per mol of it.

    Parameters
    ----------
    gas : mapping of str to float
        Mole fractions by upper-case name.
    methane : float
        Hydrocarbons as CH4 by carbon, mole fraction.

    Source
    ------
    ``COMBUSTION_EFFICIENCY``.
    """
    unburnt = {species: gas.get(species, 0.0) for species in ("CO", "H2", "NH3")}
    unburnt["CH4"] = methane
    return sum(share * iso_heat_of(species).lower for species, share in unburnt.items())


def efficiency_from_indices(
    ei_co: float, ei_uhc: float, lower_heating_value: float, uhc_heating_value: float | None = None
) -> float:
    """Return combustion efficiency from measured emission indices of CO and hydrocarbons.

    Parameters
    ----------
    ei_co, ei_uhc : float
        kg per kg fuel.
    lower_heating_value : float
        Of the fuel, J/kg.
    uhc_heating_value : float, optional
        Of the hydrocarbons on the basis of ``ei_uhc``, J/kg; methane when not given. Aircraft
        practice counts them as the fuel.

    Source
    ------
    ``COMBUSTION_EFFICIENCY``.
    """
    if uhc_heating_value is None:
        uhc_heating_value = iso_heat_of("CH4").lower / CH4_MOLAR_MASS
    co_heating_value = iso_heat_of("CO").lower / CO_MOLAR_MASS
    left = ei_co * co_heating_value + ei_uhc * uhc_heating_value
    return 1.0 - left / lower_heating_value
