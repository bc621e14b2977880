"""Emissions of one exhaust gas on every basis that is reported."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from combustor.emissions import bases
from combustor.emissions.unburnt import has_reference, heat_left, methane_equivalent
from combustor.fuel.gas import Array, Gas
from combustor.fuel.heating_value import atoms_in
from combustor.fuel.record import Fuel


@dataclass(frozen=True)
class Emissions:
    """Emissions of one gas; SI and fractions throughout, None where a basis is undefined.

    Parameters
    ----------
    ei_nox, ei_co, ei_uhc : float or None
        kg per kg fuel. NOx (NO + NO2) as NO2; unburnt hydrocarbons as CH4 by carbon. None
        without fuel.
    nox_dry_15, co_dry_15, n2o_dry_15, nh3_dry_15 : float or None
        Mole fractions, dry, at 15 % O2 with 20.95 % O2 in air. None when the gas is rich or
        its dry O2 is above 20 %.
    nox_mass_15, co_mass_15 : float or None
        kg per dry m3 (0 degC, 101.325 kPa) at 15 % O2; NOx as NO2.
    nox_per_energy : float or None
        kg NO2 per J of lower heating value.
    o2_dry, co2_dry, h2o_wet : float
        Mole fractions as found.
    combustion_efficiency : float or None
        1 - (CO, H2, NH3 and hydrocarbons as CH4, each at its lower heating value) / fuel's.
    no_share : float or None
        NO / (NO + NO2) by mole; None without NOx.
    wet : mapping of str to float
        Mole fractions in the gas as it flows: NO, NO2, CO, UHC (as CH4 by carbon), N2O, NH3,
        CO2, O2, H2O, those that the mechanism holds.
    gas_flow, fuel_flow : float
        Wet gas and fuel, kg/s.
    mean_molar_mass : float or None
        Of the wet gas, kg/mol.
    """

    ei_nox: float | None
    ei_co: float | None
    ei_uhc: float | None
    nox_dry_15: float | None
    co_dry_15: float | None
    n2o_dry_15: float | None
    nox_mass_15: float | None
    co_mass_15: float | None
    nox_per_energy: float | None
    o2_dry: float
    co2_dry: float
    h2o_wet: float
    combustion_efficiency: float | None
    no_share: float | None
    nh3_dry_15: float | None = None
    wet: Mapping[str, float] = field(default_factory=dict)
    gas_flow: float | None = None
    fuel_flow: float | None = None
    mean_molar_mass: float | None = None


def from_exhaust(
    mole_fractions: Mapping[str, float],
    gas_flow: float,
    mean_molar_mass: float,
    fuel_flow: float,
    lower_heating_value: float,
    species_atoms: Mapping[str, Mapping[str, float]],
) -> Emissions:
    """Return the emissions of a gas on every basis.

    Parameters
    ----------
    mole_fractions : mapping of str to float
        In the wet gas, every species.
    gas_flow : float
        Mass flow of the wet gas, fuel included, kg/s.
    mean_molar_mass : float
        Of the wet gas, kg/mol.
    fuel_flow : float
        kg/s; 0 where no fuel is burnt.
    lower_heating_value : float
        Of the fuel, J/kg at 15 degC.
    species_atoms : mapping of str to mapping
        Atoms of every species in ``mole_fractions``.

    Notes
    -----
    Hydrocarbons are species that hold carbon and hydrogen and no nitrogen. NOx, N2O and NH3
    are None, not zero, when the mechanism does not hold them.

    Source
    ------
    ``unburnt.COMBUSTION_EFFICIENCY``, ``bases.REFERENCE_OXYGEN_CORRECTION``.
    """
    gas = {species.upper(): share for species, share in mole_fractions.items()}
    water = gas.get("H2O", 0.0)
    o2_dry = bases.dry(gas.get("O2", 0.0), water)
    corrected = has_reference(mole_fractions, species_atoms, o2_dry)

    def dry_15(fraction: float | None) -> float | None:
        if fraction is None or not corrected:
            return None
        return bases.at_reference_oxygen(bases.dry(fraction, water), o2_dry)

    def index(fraction: float | None, molar_mass: float) -> float | None:
        if fraction is None or fuel_flow <= 0.0:
            return None
        return bases.emission_index(fraction, molar_mass, mean_molar_mass, gas_flow / fuel_flow)

    nox = gas["NO"] + gas.get("NO2", 0.0) if "NO" in gas else None
    carbon_monoxide = gas.get("CO", 0.0)
    methane = methane_equivalent(mole_fractions, species_atoms)
    ei_nox = index(nox, bases.NO2_MOLAR_MASS)
    nox_15, co_15 = dry_15(nox), dry_15(carbon_monoxide)
    efficiency = None
    if fuel_flow > 0.0:
        left = heat_left(gas, methane) / mean_molar_mass * gas_flow
        efficiency = 1.0 - left / (fuel_flow * lower_heating_value)
    return Emissions(
        ei_nox=ei_nox,
        ei_co=index(carbon_monoxide, bases.CO_MOLAR_MASS),
        ei_uhc=index(methane, bases.CH4_MOLAR_MASS),
        nox_dry_15=nox_15,
        co_dry_15=co_15,
        n2o_dry_15=dry_15(gas.get("N2O")),
        nox_mass_15=_mass(nox_15, bases.NO2_MOLAR_MASS),
        co_mass_15=_mass(co_15, bases.CO_MOLAR_MASS),
        nox_per_energy=None if ei_nox is None else bases.per_energy(ei_nox, lower_heating_value),
        o2_dry=o2_dry,
        co2_dry=bases.dry(gas.get("CO2", 0.0), water),
        h2o_wet=water,
        combustion_efficiency=efficiency,
        no_share=gas["NO"] / nox if nox else None,
        nh3_dry_15=dry_15(gas.get("NH3")),
        wet=_as_found(gas, methane),
        gas_flow=gas_flow,
        fuel_flow=fuel_flow,
        mean_molar_mass=mean_molar_mass,
    )


def from_gas(
    gas: Gas, mass_fractions: Array, gas_flow: float, fuel_flow: float, fuel: Fuel
) -> Emissions:
    """Return the emissions of a gas given by its mass fractions.

    Parameters
    ----------
    gas : Gas
        The mechanism.
    mass_fractions : ndarray
    gas_flow, fuel_flow : float
        Wet gas (fuel included) and fuel, kg/s.
    fuel : Fuel
        Its lower heating value is used.
    """
    fractions = gas.mole_fractions(mass_fractions).tolist()
    return from_exhaust(
        dict(zip(gas.species_names, fractions, strict=True)),
        gas_flow,
        gas.mean_molar_mass(mass_fractions),
        fuel_flow,
        fuel.lower_heating_value,
        {species: atoms_in(gas, species) for species in gas.species_names},
    )


def _as_found(gas: Mapping[str, float], methane: float) -> dict[str, float]:
    species = ("NO", "NO2", "CO", "N2O", "NH3", "CO2", "O2", "H2O")
    return {**{name: gas[name] for name in species if name in gas}, "UHC": methane}


def _mass(fraction: float | None, molar_mass: float) -> float | None:
    return None if fraction is None else bases.mass_concentration(fraction, molar_mass)
