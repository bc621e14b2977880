"""Rates of the chemistry and their derivatives, per mass of gas.

Compositions are specific moles `n` [kmol/kg]: with them the equations of an open system are linear
but for the rates, and any Newton step keeps elements and mass exactly.
"""

from __future__ import annotations

import cantera as ct
import numpy as np
from numpy.typing import NDArray
from scipy import sparse

Array = NDArray[np.float64]

# Specific moles below this are raised to it inside the derivative, where a rate is divided by the
# amount of a reactant; an absent species then keeps the derivative of its first trace.
LEAST_MOLES = 1e-24

LOWEST_TEMPERATURE = 100.0  # K
HIGHEST_TEMPERATURE = 6000.0  # K

# Where two polynomials of a species meet, its enthalpy may jump by as much as this many kelvin
# are worth, and a mixture's enthalpy may fall between: the nearest temperature is then the answer.
POLYNOMIAL_GAP = 1e-3


class Rates:
    """Production rates of one mechanism and their exact derivatives at constant enthalpy.

    Parameters
    ----------
    solution : cantera.Solution
        The ideal gas; its state is set anew by every call.
    """

    def __init__(self, solution: ct.Solution) -> None:
        self._solution = solution
        self.molar_masses: Array = solution.molecular_weights
        size, reactions = solution.n_species, solution.n_reactions
        self._size = size
        net = solution.product_stoich_coeffs - solution.reactant_stoich_coeffs
        self._by_species = self._concentration_pattern(net)
        with_third_body = [
            place for place in range(reactions) if solution.reaction(place).third_body is not None
        ]
        self._third_body = np.array(with_third_body, dtype=int)
        self._efficiency = np.array(
            [
                [self._efficiency_of(place, name) for name in solution.species_names]
                for place in with_third_body
            ]
        ).reshape(len(with_third_body), size)
        self._third_body_net = np.ascontiguousarray(net[:, self._third_body])
        # A third body of a plain reaction multiplies its rate; in a falloff or chemically
        # activated one it acts through the rate constant alone.
        self._multiplies = np.array(
            [
                0.0 if "falloff" in solution.reaction(place).rate.type else 1.0
                for place in with_third_body
            ]
        )
        self._through_constant = bool(np.any(self._multiplies == 0.0))

    def _efficiency_of(self, reaction: int, species: str) -> float:
        body = self._solution.reaction(reaction).third_body
        assert body is not None  # asked only of reactions that have one
        return float(body.efficiencies.get(species, body.default_efficiency))

    def _concentration_pattern(self, net: Array) -> sparse.csr_array:
        """Map rates of progress, forward then reverse, to n_j * d(production of k)/d(n_j)."""
        solution, size = self._solution, self._size
        count = solution.n_reactions
        place = {name: index for index, name in enumerate(solution.species_names)}
        rows, columns, values = [], [], []
        for index in range(count):
            reaction = solution.reaction(index)
            forward = {**reaction.reactants, **reaction.orders}
            changed = np.flatnonzero(net[:, index])
            sides = ((forward, index, 1.0), (reaction.products, count + index, -1.0))
            for orders, column, sign in sides:
                for name, order in orders.items():
                    for species in changed:
                        rows.append(int(species) * size + place[name])
                        columns.append(column)
                        values.append(sign * order * net[species, index])
        shape = (size * size, 2 * count)
        return sparse.coo_array((values, (rows, columns)), shape=shape).tocsr()

    def production(self, temperature: float, pressure: float, moles: Array) -> Array:
        """Return the net production of every species [kmol/(kg s)]."""
        self._set(temperature, pressure, moles)
        return self._solution.net_production_rates / self._solution.density

    def derivatives(self, temperature: float, pressure: float, moles: Array) -> tuple[Array, Array]:
        """Return production and its derivative by composition at constant enthalpy and pressure.

        Parameters
        ----------
        temperature : float
            [K]
        pressure : float
            [Pa]
        moles : ndarray
            [kmol/kg]

        Returns
        -------
        production : ndarray
            [kmol/(kg s)]
        derivative : ndarray
            d(production of row) / d(moles of column) [1/s]
        """
        solution, size = self._solution, self._size
        sampled = np.where(np.abs(moles) < LEAST_MOLES, LEAST_MOLES, moles)
        self._set(temperature, pressure, sampled)
        density = solution.density
        rate = solution.net_production_rates
        progress = np.concatenate(
            (solution.forward_rates_of_progress, solution.reverse_rates_of_progress)
        )
        by_moles = (self._by_species @ progress).reshape(size, size)
        by_density = by_moles.sum(axis=1)
        by_moles /= sampled
        if self._third_body.size:
            slope = self._third_body_slope()
            by_body = (self._third_body_net * slope) @ self._efficiency
            by_moles += by_body * density
            by_density += by_body @ (sampled * density)
        by_temperature = solution.net_production_rates_ddT - (by_density - rate) / temperature
        by_moles -= ((by_density - rate) / sampled.sum())[:, None]
        by_moles -= (by_temperature / solution.cp_mass)[:, None] * solution.partial_molar_enthalpies
        by_moles /= density
        return rate / density, by_moles

    def _third_body_slope(self) -> Array:
        """Return d(net rate of progress) / d(third-body concentration) [1/s]."""
        solution = self._solution
        body = solution.third_body_concentrations[self._third_body]
        body = np.where(body > 0.0, body, np.inf)
        slope = self._multiplies
        if self._through_constant:
            constant = solution.forward_rate_constants
            by_total = solution.forward_rate_constants_ddC
            with np.errstate(invalid="ignore", divide="ignore"):
                order = np.where(constant > 0.0, by_total / constant, 0.0)
            slope = slope + order[self._third_body] * solution.density_mole
        return solution.net_rates_of_progress[self._third_body] * slope / body

    def _set(self, temperature: float, pressure: float, moles: Array) -> None:
        self._solution.set_unnormalized_mass_fractions(moles * self.molar_masses)
        self._solution.TP = temperature, pressure

    def temperature(self, enthalpy: float, pressure: float, moles: Array, guess: float) -> float:
        """Return the temperature of a mixture of given enthalpy.

        Parameters
        ----------
        enthalpy : float
            [J/kg]
        pressure : float
            [Pa]
        moles : ndarray
            May hold slightly negative entries, as iterates do [kmol/kg]
        guess : float
            [K]

        Returns
        -------
        float
            NaN where no temperature between 100 and 6000 K fits: an iterate gone astray [K]
        """
        solution = self._solution
        solution.set_unnormalized_mass_fractions(moles * self.molar_masses)
        value, change = guess, float("inf")
        for _ in range(40):
            solution.TP = value, pressure
            change = (enthalpy - solution.enthalpy_mass) / solution.cp_mass
            if not abs(change) < 1e5:
                return float("nan")
            value += min(max(change, -0.3 * value), 0.3 * value)
            if not LOWEST_TEMPERATURE < value < HIGHEST_TEMPERATURE:
                return float("nan")
            if abs(change) < 1e-11 * value:
                return value
        return value if abs(change) < POLYNOMIAL_GAP else float("nan")

    def volume_slope(
        self, temperature: float, pressure: float, moles: Array
    ) -> tuple[float, Array]:
        """Return specific volume and its derivative by composition at constant enthalpy.

        Parameters
        ----------
        temperature : float
            [K]
        pressure : float
            [Pa]
        moles : ndarray
            [kmol/kg]

        Returns
        -------
        volume : float
            [m3/kg]
        slope : ndarray
            [m3/kmol]
        """
        self._set(temperature, pressure, moles)
        total = moles.sum()
        by_enthalpy = self._solution.partial_molar_enthalpies / self._solution.cp_mass
        factor = ct.gas_constant / pressure
        return factor * temperature * total, factor * (temperature - total * by_enthalpy)
