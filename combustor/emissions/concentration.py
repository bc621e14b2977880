"""A concentration that knows its basis: unlike ones cannot be compared, added or averaged."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Literal

from combustor.base.errors import InputError, Problem
from combustor.emissions import bases
from combustor.emissions.pollutant import find, mass_of

Moisture = Literal["wet", "dry"]


class BasisError(InputError):
    """Two concentrations do not stand on one basis, or a basis lacks what a step needs."""


@dataclass(frozen=True)
class OxygenState:
    """O2 of the gas a concentration belongs to.

    Parameters
    ----------
    fraction : float or None
        DRY mole fraction; None where nobody measured it.
    in_air : float or None
        O2 of dry air by which the concentration was brought here; None for gas as found.
    """

    fraction: float | None
    in_air: float | None = None

    @property
    def text(self) -> str:
        """The state in words."""
        if self.fraction is None:
            return "O2 not known"
        percent = f"{100.0 * self.fraction:.4g} % O2"
        return f"at {percent}" if self.in_air is not None else f"as found, {percent}"


@dataclass(frozen=True)
class Basis:
    """What a concentration is a concentration of, and in which gas.

    Parameters
    ----------
    pollutant : str
    counted_as : str
        Formula as which its mass is stated.
    moisture : {"wet", "dry"}
    oxygen : OxygenState
    temperature : float or None
        At which the m3 is counted (101.325 kPa), K; None for a mole fraction.
    water : float or None
        Mole fraction of water in the wet gas, where known.
    """

    pollutant: str
    counted_as: str
    moisture: Moisture
    oxygen: OxygenState
    temperature: float | None = None
    water: float | None = None

    def like(self, other: Basis) -> bool:
        """Say whether values on both bases can be compared."""
        moist = self.moisture == "dry" or self.water == other.water
        return moist and replace(self, water=None) == replace(other, water=None)

    @property
    def text(self) -> str:
        """The basis in words."""
        size = "by volume" if self.temperature is None else f"mass as {self.counted_as}"
        if self.temperature is not None:
            size += f" per m3 at {self.temperature - 273.15:.4g} degC"
        return f"{self.pollutant}, {size}, {self.moisture}, {self.oxygen.text}"


@dataclass(frozen=True)
class Concentration:
    """A value (mole fraction, or kg/m3) on its basis."""

    value: float
    basis: Basis

    def dry(self) -> Concentration:
        """Return it in the gas without its water.

        Raises
        ------
        BasisError
            The water of the gas is not known.
        """
        if self.basis.moisture == "dry":
            return self
        return Concentration(
            bases.dry(self.value, self._water()), replace(self.basis, moisture="dry")
        )

    def wet(self, water: float | None = None) -> Concentration:
        """Return it in the gas with its water (mole fraction in the wet gas)."""
        if self.basis.moisture == "wet":
            return self
        share = self._water() if water is None else water
        basis = replace(self.basis, moisture="wet", water=share)
        return Concentration(bases.wet(self.value, share), basis)

    def at_oxygen(self, reference: float, in_air: float) -> Concentration:
        """Return it after mixing with dry air until dry O2 is ``reference``.

        A wet concentration stays wet: its water is diluted by the same air.

        Raises
        ------
        BasisError
            The gas's O2 is not known, or was already referred with another O2 of air.
        """
        state = self.basis.oxygen
        if state.fraction is None:
            raise _lacking("O2 of the gas", "give the dry O2 found with the pollutant", self.basis)
        if state.in_air is not None and state.in_air != in_air:
            raise _lacking(
                f"one O2 of air: referred with {state.in_air:g}, now {in_air:g}",
                "go back to the gas as found first",
                self.basis,
            )
        factor = bases.at_reference_oxygen(1.0, state.fraction, reference, in_air)
        water = self.basis.water
        share = 0.0 if water is None else water / (1.0 - water)
        new_water = None if water is None else share / (1.0 / factor + share)
        scale = factor
        if self.basis.moisture == "wet":
            self._water()
            scale = (1.0 + share) / (1.0 / factor + share)
        basis = replace(self.basis, oxygen=OxygenState(reference, in_air), water=new_water)
        return Concentration(self.value * scale, basis)

    def as_mass(self, temperature: float, counted_as: str | None = None) -> Concentration:
        """Return it as kg/m3 at ``temperature`` (K) and 101.325 kPa, counted as a substance."""
        formula = counted_as or self.basis.counted_as
        fraction = self.as_fraction()
        basis = replace(fraction.basis, temperature=temperature, counted_as=formula)
        mass = bases.mass_concentration(fraction.value, mass_of(formula), temperature)
        return Concentration(mass, basis)

    def as_fraction(self) -> Concentration:
        """Return it as mole fraction."""
        temperature = self.basis.temperature
        if temperature is None:
            return self
        mass = mass_of(self.basis.counted_as)
        basis = replace(
            self.basis, temperature=None, counted_as=find(self.basis.pollutant).counted_as
        )
        return Concentration(bases.mole_fraction(self.value, mass, temperature), basis)

    def __add__(self, other: Concentration) -> Concentration:
        return Concentration(self.value + self._same(other, "added"), self.basis)

    def __sub__(self, other: Concentration) -> Concentration:
        return Concentration(self.value - self._same(other, "subtracted"), self.basis)

    def __truediv__(self, number: float) -> Concentration:
        return Concentration(self.value / number, self.basis)

    def __lt__(self, other: Concentration) -> bool:
        return self.value < self._same(other, "compared")

    def __le__(self, other: Concentration) -> bool:
        return self.value <= self._same(other, "compared")

    def __gt__(self, other: Concentration) -> bool:
        return self.value > self._same(other, "compared")

    def __ge__(self, other: Concentration) -> bool:
        return self.value >= self._same(other, "compared")

    def _same(self, other: Concentration, done: str) -> float:
        if not self.basis.like(other.basis):
            raise BasisError(
                Problem(
                    f"concentrations on unlike bases cannot be {done}: "
                    f"({self.basis.text}) and ({other.basis.text})",
                    "bring both to one basis first",
                )
            )
        return other.value

    def _water(self) -> float:
        if self.basis.water is None:
            raise _lacking("the water of the gas", "give its moisture", self.basis)
        return self.basis.water


def measured(
    value: float,
    pollutant: str,
    oxygen: float | None,
    moisture: Moisture = "dry",
    oxygen_moisture: Moisture | None = None,
    water: float | None = None,
) -> Concentration:
    """Return what an analyser showed.

    Parameters
    ----------
    value : float
        Mole fraction.
    pollutant : str
    oxygen : float or None
        Mole fraction as the O2 cell showed it.
    moisture, oxygen_moisture : {"wet", "dry"}
        Of the sample to each; the O2 cell sees the same gas unless said otherwise.
    water : float, optional
        Mole fraction in the wet gas; needed as soon as something was measured wet.

    Raises
    ------
    BasisError
        Something is wet and the water is not known.
    """
    found = find(pollutant)
    wet_oxygen = (oxygen_moisture or moisture) == "wet"
    if water is None and (moisture == "wet" or wet_oxygen):
        raise BasisError(
            Problem(
                "measured wet, and the water of the gas is not known",
                "give the moisture of the gas, e.g. 8 %",
                "moisture",
            )
        )
    dry_oxygen = oxygen
    if oxygen is not None and wet_oxygen and water is not None:
        dry_oxygen = bases.dry(oxygen, water)
    state = OxygenState(dry_oxygen)
    return Concentration(value, Basis(found.name, found.counted_as, moisture, state, None, water))


def mean(runs: Sequence[Concentration]) -> Concentration:
    """Return the mean of runs on one basis.

    Raises
    ------
    BasisError
        Unlike bases, such as runs at different O2 not yet brought to the reference.
    """
    total = runs[0]
    for run in runs[1:]:
        total = total + run
    waters = [run.basis.water for run in runs if run.basis.water is not None]
    water = sum(waters) / len(runs) if len(waters) == len(runs) else None
    return Concentration(total.value / len(runs), replace(total.basis, water=water))


def _lacking(what: str, allowed: str, basis: Basis) -> BasisError:
    return BasisError(Problem(f"{what} is needed ({basis.text})", allowed))
