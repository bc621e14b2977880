"""The fuel as everything downstream sees it."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

from combustor.fuel import wobbe


@dataclass(frozen=True)
class Liquid:
    """What a fuel is before it evaporates.

    Parameters
    ----------
    density : float
        At 15 degC, kg/m3.
    latent_heat : float
        At 15 degC, J/kg.
    heat_capacity : float
        J/kg/K.
    viscosity, surface_tension : float
        At injection, Pa s and N/m.
    sulfur, nitrogen, aromatics : float
        Mass, mass and volume fraction.
    """

    density: float
    latent_heat: float
    heat_capacity: float
    viscosity: float
    surface_tension: float
    sulfur: float = 0.0
    nitrogen: float = 0.0
    aromatics: float = 0.0


@dataclass(frozen=True)
class Fuel:
    """A fuel with its mixture properties and the mechanism that burns it.

    Parameters
    ----------
    name : str
        Catalogue name, blend as written, or ``"stated composition"``.
    composition : mapping of str to float
        Mole fractions, sum 1, under the species names of ``mechanism``.
    molar_mass : float
        kg/mol.
    lower_heating_value, higher_heating_value : float
        J/kg of the whole fuel (inerts included), reactants and products at 15 degC, fuel as
        it is supplied: gas, or the liquid of a liquid fuel. The one heating value of this
        package: efficiency, emission per energy and everything quoted use it.
    heating_value_basis : str
        Where the molar heating values come from.
    mechanism_lower_heating_value : float
        The same from the mechanism's own thermodynamics, J/kg; what the flame releases. Of a
        liquid less the latent heat.
    stoichiometric_fuel_air_ratio : float
        kg fuel per kg DRY air.
    stoichiometric_oxygen : float
        mol O2 to burn one mol of fuel.
    atoms : mapping of str to float
        Atoms of each element per mean molecule.
    hydrogen_mass_fraction : float
    carbon_hydrogen_mass_ratio : float or None
        None when the fuel holds no hydrogen.
    mechanism : str
        Path or name under which the mechanism is loaded.
    mechanism_note : str
        Its validity in a sentence.
    cautions : tuple of str
        What the user must know before trusting a result on this fuel.
    source : str
        Where the composition comes from.
    phase : {"gas", "liquid"}
    liquid : Liquid or None
        None for a gas.
    """

    name: str
    composition: Mapping[str, float]
    molar_mass: float
    lower_heating_value: float
    higher_heating_value: float
    heating_value_basis: str
    mechanism_lower_heating_value: float
    stoichiometric_fuel_air_ratio: float
    stoichiometric_oxygen: float
    atoms: Mapping[str, float]
    hydrogen_mass_fraction: float
    carbon_hydrogen_mass_ratio: float | None
    mechanism: str
    mechanism_note: str
    cautions: tuple[str, ...] = ()
    source: str = ""
    phase: Literal["gas", "liquid"] = "gas"
    liquid: Liquid | None = None

    @property
    def density_15(self) -> float:
        """Density at 15 degC, kg/m3: of the liquid, or ideal gas at 101.325 kPa."""
        if self.liquid is not None:
            return self.liquid.density
        return wobbe.ideal_density(self.molar_mass)

    @property
    def relative_density(self) -> float | None:
        """Density over that of dry air, ideal gas; None for a liquid."""
        return None if self.liquid else wobbe.relative_density(self.molar_mass)

    @property
    def lower_heat_per_volume(self) -> float:
        """Lower heating value per volume, J/m3: gas at 15/15, liquid at 15 degC."""
        return self.lower_heating_value * self.density_15

    @property
    def higher_heat_per_volume(self) -> float:
        """Higher heating value per volume, J/m3: gas at 15/15, liquid at 15 degC."""
        return self.higher_heating_value * self.density_15

    @property
    def wobbe_lower(self) -> float | None:
        """Wobbe index on the lower heating value at 15/15, J/m3; None for a liquid."""
        if self.liquid is not None:
            return None
        return wobbe.wobbe_index(self.lower_heating_value, self.molar_mass)

    @property
    def wobbe_higher(self) -> float | None:
        """Wobbe index on the higher heating value at 15/15, J/m3; None for a liquid."""
        if self.liquid is not None:
            return None
        return wobbe.wobbe_index(self.higher_heating_value, self.molar_mass)
