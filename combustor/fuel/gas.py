"""The gas: one reaction mechanism with its thermodynamics, in plain SI floats and arrays.

A `Gas` wraps one Cantera solution. It is built once and handed around; every call sets the state
it needs, so nothing a caller did before can change an answer.
"""

from __future__ import annotations

import warnings
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path
from typing import Protocol

import cantera as ct
import numpy as np
from numpy.typing import NDArray

from combustor.base.errors import InputError, NotConvergedError, Problem
from combustor.base.method import Method
from combustor.fuel.lumped import parted, with_lumps
from combustor.fuel.mechanism import locate
from combustor.fuel.rates import POLYNOMIAL_GAP, Rates

Array = NDArray[np.float64]

UNIVERSAL_GAS_CONSTANT = 8.31446261815324  # J/(mol K), exact since the SI of 2019
STANDARD_TEMPERATURE = 288.15  # K, ISO 13443 reference of heating values used here
STANDARD_PRESSURE = 101325.0  # Pa
ISO_DAY_HUMIDITY = 0.00634  # kg water per kg dry air

BURNT_ELEMENTS = ("C", "H", "O", "N")
DRY_AIR: Mapping[str, float] = {"O2": 0.2095, "N2": 0.7808, "AR": 0.0093, "CO2": 0.0004}

DRY_AIR_COMPOSITION = Method(
    key="dry-air-composition",
    quantity="dry air in mole fractions",
    source="common rounding of the standard atmosphere's dry air (O2, N2, Ar, CO2)",
    reading="common practice, no source",
)


class Composed(Protocol):
    """Anything with a composition in mole fractions, such as a fuel."""

    @property
    def composition(self) -> Mapping[str, float]:
        """Mole fractions by species name."""


@dataclass(frozen=True)
class GasState:
    """One state of the gas.

    Parameters
    ----------
    temperature : float
        [K]
    pressure : float
        [Pa]
    mass_fractions : ndarray
        By species of the mechanism [-]
    enthalpy : float
        Formation and sensible [J/kg]
    """

    temperature: float
    pressure: float
    mass_fractions: Array
    enthalpy: float


class Gas:
    """Thermodynamics and rates of one ideal-gas mechanism.

    Parameters
    ----------
    solution : cantera.Solution
        Ideal gas, without transport. It belongs to this object from now on.
    mechanism : str
        Where it came from.
    """

    def __init__(self, solution: ct.Solution, mechanism: str) -> None:
        self.solution = solution
        self.mechanism = mechanism
        self.species_names: tuple[str, ...] = tuple(solution.species_names)
        self.element_names: tuple[str, ...] = tuple(solution.element_names)
        self.n_species: int = solution.n_species
        self.molar_masses: Array = solution.molecular_weights / 1000.0
        self.element_matrix: Array = np.array(
            [
                [solution.n_atoms(species, element) for species in range(solution.n_species)]
                for element in range(solution.n_elements)
            ],
            dtype=float,
        )
        self._index = {name: place for place, name in enumerate(self.species_names)}
        # "C3H6,propylene" answers to "C3H6" as well, where that says enough
        short = {name.partition(",")[0].upper(): i for i, name in enumerate(self.species_names)}
        full = {name.upper(): place for place, name in enumerate(self.species_names)}
        self._folded = {**short, **full}

    @classmethod
    def load(cls, mechanism: str | Path) -> Gas:
        """Read a mechanism by path, shipped name or Cantera's own name, lumped species included.

        Raises
        ------
        InputError
            No such file, a file Cantera cannot read, or one that is not an ideal gas.
        """
        file, lumps = parted(mechanism)
        path = locate(file)
        try:
            solution = ct.Solution(str(path), transport_model=None)
        except (ct.CanteraError, RuntimeError, ValueError, UnicodeDecodeError) as error:
            lines = [line for line in str(error).splitlines() if line.strip(" *")]
            raise InputError(
                Problem(
                    f"Cantera cannot read this mechanism: {' '.join(lines[:3])[:300]}",
                    key="mechanism",
                    value=str(path),
                    allowed="give a Cantera YAML file whose first phase is an ideal gas",
                )
            ) from error
        if solution.thermo_model != "ideal-gas" or solution.n_reactions == 0:
            raise InputError(
                Problem(
                    "the first phase of this mechanism is not a reacting ideal gas",
                    key="mechanism",
                    value=str(path),
                    allowed="give a Cantera YAML file whose first phase is an ideal gas",
                )
            )
        if lumps:
            return cls(with_lumps(solution, lumps), str(mechanism))
        return cls(solution, str(path))

    # -- composition -------------------------------------------------------------------------

    def has(self, species: str) -> bool:
        """Say whether the mechanism knows a species (in any letter case)."""
        return species in self._index or species.upper() in self._folded

    def index(self, species: str) -> int:
        """Return the place of a species in every composition array.

        Raises
        ------
        InputError
            The mechanism has no such species.
        """
        if species in self._index:
            return self._index[species]
        try:
            return self._folded[species.upper()]
        except KeyError:
            raise InputError(
                Problem(
                    "species not in the mechanism",
                    key="composition",
                    value=species,
                    allowed=f"{Path(parted(self.mechanism)[0]).name} has {self.n_species} species; "
                    "choose another mechanism or another fuel",
                )
            ) from None

    def from_mole_fractions(self, composition: Mapping[str, float]) -> Array:
        """Return mass fractions of a mixture given in moles of each species (any total).

        Parameters
        ----------
        composition : mapping of str to float
            Moles by species name.

        Returns
        -------
        ndarray
            Mass fractions, summing to one [-]
        """
        moles = np.zeros(self.n_species)
        for species, share in composition.items():
            moles[self.index(species)] += share
        masses = moles * self.molar_masses
        return masses / masses.sum()

    def air(self, humidity: float = ISO_DAY_HUMIDITY) -> Array:
        """Return mass fractions of moist air.

        Argon and carbon dioxide count as nitrogen in a mechanism that lacks them.

        Parameters
        ----------
        humidity : float
            Water per dry air by mass [-]

        Returns
        -------
        ndarray
            Mass fractions [-]
        """
        dry: dict[str, float] = {}
        for species, share in DRY_AIR.items():
            known = species if self.has(species) else "N2"
            dry[known] = dry.get(known, 0.0) + share
        fractions = self.from_mole_fractions(dry)
        if humidity != 0.0:
            fractions[self.index("H2O")] += humidity
        return fractions / (1.0 + humidity)

    def fuel(self, fuel: Composed) -> Array:
        """Return mass fractions of a gaseous fuel [-]."""
        return self.from_mole_fractions(fuel.composition)

    def mole_fractions(self, mass_fractions: Array) -> Array:
        """Return mole fractions [-]."""
        moles = mass_fractions / self.molar_masses
        return moles / moles.sum()

    def mean_molar_mass(self, mass_fractions: Array) -> float:
        """Return the mean molar mass [kg/mol]."""
        return float(mass_fractions.sum() / (mass_fractions / self.molar_masses).sum())

    def gas_constant(self, mass_fractions: Array) -> float:
        """Return the specific gas constant [J/(kg K)]."""
        return UNIVERSAL_GAS_CONSTANT * float((mass_fractions / self.molar_masses).sum())

    def element_moles(self, mass_fractions: Array) -> Array:
        """Return moles of each element per mass of mixture [mol/kg]."""
        return self.element_matrix @ (mass_fractions / self.molar_masses)

    # -- state -------------------------------------------------------------------------------

    def enthalpy(self, temperature: float, pressure: float, mass_fractions: Array) -> float:
        """Return the enthalpy, formation and sensible [J/kg]."""
        self._set(temperature, pressure, mass_fractions)
        return float(self.solution.enthalpy_mass)

    def density(self, temperature: float, pressure: float, mass_fractions: Array) -> float:
        """Return the density of the ideal gas [kg/m3]."""
        return pressure / (self.gas_constant(mass_fractions) * temperature)

    def heat_capacity(self, temperature: float, pressure: float, mass_fractions: Array) -> float:
        """Return the heat capacity at constant pressure, composition frozen [J/(kg K)]."""
        self._set(temperature, pressure, mass_fractions)
        return float(self.solution.cp_mass)

    def heat_capacity_ratio(
        self, temperature: float, pressure: float, mass_fractions: Array
    ) -> float:
        """Return the ratio of the frozen heat capacities [-]."""
        capacity = self.heat_capacity(temperature, pressure, mass_fractions)
        return capacity / (capacity - self.gas_constant(mass_fractions))

    def temperature(
        self, enthalpy: float, pressure: float, mass_fractions: Array, guess: float = 1000.0
    ) -> float:
        """Return the temperature at which a mixture has a given enthalpy.

        Parameters
        ----------
        enthalpy : float
            Formation and sensible [J/kg]
        pressure : float
            [Pa]
        mass_fractions : ndarray
            [-]
        guess : float
            Start of the search [K]

        Returns
        -------
        float
            [K]

        Raises
        ------
        NotConvergedError
            No temperature between 50 and 6000 K has that enthalpy.
        """
        solution = self.solution
        solution.set_unnormalized_mass_fractions(mass_fractions)
        value, change = guess, np.inf
        for _ in range(60):
            solution.TP = value, pressure
            change = (enthalpy - solution.enthalpy_mass) / solution.cp_mass
            value = min(max(value + change, 0.5 * value, 50.0), 2.0 * value, 6000.0)
            if abs(change) <= 1e-11 * value:
                return float(value)
        if abs(change) < POLYNOMIAL_GAP:
            return float(value)
        raise NotConvergedError(
            f"no temperature between 50 and 6000 K gives an enthalpy of {enthalpy:.6g} J/kg"
        )

    def state(self, temperature: float, pressure: float, mass_fractions: Array) -> GasState:
        """Return the state at a given temperature."""
        enthalpy = self.enthalpy(temperature, pressure, mass_fractions)
        return GasState(temperature, pressure, mass_fractions, enthalpy)

    def equilibrium(self, enthalpy: float, pressure: float, mass_fractions: Array) -> GasState:
        """Return chemical equilibrium at constant enthalpy and pressure.

        Parameters
        ----------
        enthalpy : float
            [J/kg]
        pressure : float
            [Pa]
        mass_fractions : ndarray
            Of the mixture before it reacts; only its elements matter [-]

        Returns
        -------
        GasState
            At equilibrium.

        Raises
        ------
        NotConvergedError
            None of Cantera's equilibrium solvers found it.
        """
        solution = self.solution
        unburnt = self.temperature(enthalpy, pressure, mass_fractions)
        for solver in ("element_potential", "gibbs", "vcs"):
            solution.TPY = unburnt, pressure, mass_fractions
            try:
                with warnings.catch_warnings():
                    # Of a start colder than the polynomials' 300 K, as cold inlet air is.
                    warnings.simplefilter("ignore", UserWarning)
                    solution.equilibrate("HP", solver=solver, rtol=1e-10)
            except ct.CanteraError:
                continue
            return GasState(float(solution.T), pressure, solution.Y, enthalpy)
        raise NotConvergedError(
            f"no equilibrium found at {enthalpy:.6g} J/kg and {pressure:.6g} Pa"
        )

    # -- heating value -----------------------------------------------------------------------

    def lower_heating_value(
        self, mass_fractions: Array, temperature: float = STANDARD_TEMPERATURE
    ) -> float:
        """Return the heat of complete combustion to carbon dioxide, water vapour and nitrogen.

        Parameters
        ----------
        mass_fractions : ndarray
            Of the fuel [-]
        temperature : float
            Of fuel, oxygen and products [K]

        Returns
        -------
        float
            Ideal gas; zero for a mixture with nothing to burn [J/kg]
        """
        heat = self._combustion_heats(temperature)
        return float((mass_fractions / self.molar_masses) @ heat)

    @cached_property
    def combustion_heats(self) -> Array:
        """Heat of complete combustion of each species, water as vapour [J/mol]."""
        return self._combustion_heats(STANDARD_TEMPERATURE)

    @cached_property
    def oxygen_demands(self) -> Array:
        """Oxygen molecules each species needs to burn completely; negative where it brings some."""
        need = {"C": 1.0, "H": 0.25, "O": -0.5}
        weights = np.array([need.get(element, 0.0) for element in self.element_names])
        return weights @ self.element_matrix

    @cached_property
    def rates(self) -> Rates:
        """Rates of the chemistry with their derivatives."""
        return Rates(self.solution)

    def _combustion_heats(self, temperature: float) -> Array:
        molar = self._molar_enthalpies(temperature)
        heat = molar + self.oxygen_demands * molar[self.index("O2")]
        atoms = dict(zip(self.element_names, self.element_matrix, strict=True))
        for element, share, product in (("C", 1.0, "CO2"), ("H", 0.5, "H2O"), ("N", 0.5, "N2")):
            if element in atoms and self.has(product):
                heat = heat - share * atoms[element] * molar[self.index(product)]
        reactive = sum(atoms[element] for element in atoms if element in BURNT_ELEMENTS)
        return np.where(np.asarray(reactive) > 0.0, heat, 0.0)

    def _molar_enthalpies(self, temperature: float) -> Array:
        self.solution.TP = temperature, STANDARD_PRESSURE
        return self.solution.partial_molar_enthalpies / 1000.0

    def _set(self, temperature: float, pressure: float, mass_fractions: Array) -> None:
        self.solution.set_unnormalized_mass_fractions(mass_fractions)
        self.solution.TP = temperature, pressure
