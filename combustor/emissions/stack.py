"""One exhaust and what it belongs to, expressed in any unit a rule may use."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from combustor.base.errors import InputError, Problem
from combustor.emissions import bases
from combustor.emissions.concentration import Basis, Concentration, OxygenState
from combustor.emissions.emission_unit import EmissionUnit
from combustor.emissions.exhaust import Emissions
from combustor.emissions.pollutant import find, mass_of
from combustor.emissions.sulfur import sulfur_oxides
from combustor.emissions.unburnt import MAXIMUM_DRY_OXYGEN

SECONDS_PER_HOUR = 3600.0


class FactMissing(InputError):  # noqa: N818  # a state of knowledge, caught where verdicts are made
    """A value cannot be expressed because something is not known."""

    def __init__(self, fact: str, why: str) -> None:
        self.fact = fact
        self.why = why
        super().__init__(Problem(why, f"give {fact}", fact))


@dataclass(frozen=True)
class Stack:
    """One exhaust.

    Parameters
    ----------
    wet : mapping of str to float
        Mole fractions as found, O2 and H2O among them; UHC as CH4. A species that is not
        there is not known.
    gas_flow, fuel_flow : float
        kg/s, wet gas and fuel.
    molar_mass : float
        Of the wet gas, kg/mol.
    lower_heating_value, higher_heating_value : float
        Of the fuel, J/kg.
    output : float or None
        Useful output, W.
    hours : float or None
        Operated a year.
    fuel_sulfur : float or None
        Mass fraction of the fuel.
    per_thrust : mapping of str to float
        kg/N over the landing and take-off cycle, by pollutant.
    """

    wet: Mapping[str, float]
    gas_flow: float
    fuel_flow: float
    molar_mass: float
    lower_heating_value: float
    higher_heating_value: float
    output: float | None = None
    hours: float | None = None
    fuel_sulfur: float | None = None
    per_thrust: Mapping[str, float] = field(default_factory=dict)

    def fraction(self, pollutant: str) -> float:
        """Return the wet mole fraction of a pollutant.

        Raises
        ------
        FactMissing
            The mechanism does not hold it, or the fuel's sulfur is not stated.
        """
        parts = find(pollutant).parts
        absent = [part for part in parts if part not in self.wet]
        if absent and pollutant in ("SO2", "SO3"):
            raise FactMissing("fuel_sulfur", "sulfur of the fuel is not stated")
        if (absent and pollutant != "NOx") or "NO" in absent:
            raise FactMissing(
                "a mechanism that holds it", f"{pollutant} is not part of the reaction mechanism"
            )
        return sum(self.wet.get(part, 0.0) for part in parts)

    def concentration(self, pollutant: str) -> Concentration:
        """Return a pollutant as found, dry."""
        found = find(pollutant)
        water = self.wet["H2O"]
        oxygen = OxygenState(bases.dry(self.wet["O2"], water))
        basis = Basis(found.name, found.counted_as, "wet", oxygen, None, water)
        return Concentration(self.fraction(pollutant), basis).dry()

    def mass_flow(self, pollutant: str, counted_as: str | None = None) -> float:
        """Return kg/s of a pollutant, counted as a substance."""
        mass = mass_of(counted_as or find(pollutant).counted_as)
        return self.fraction(pollutant) * mass / self.molar_mass * self.gas_flow

    def heating_value(self, heat: str) -> float:
        """Return the fuel's ``"LHV"`` or ``"HHV"``, J/kg."""
        return self.lower_heating_value if heat == "LHV" else self.higher_heating_value

    def express(
        self,
        pollutant: str,
        unit: EmissionUnit,
        reference_oxygen: float | None = None,
        oxygen_in_air: float = bases.OXYGEN_IN_AIR,
        counted_as: str | None = None,
    ) -> float:
        """Return a pollutant in ``unit``.

        Parameters
        ----------
        pollutant : str
        unit : EmissionUnit
        reference_oxygen : float, optional
            For a concentration whose unit names none; as found when both are silent.
        oxygen_in_air : float
            By which a concentration is referred.
        counted_as : str, optional
            Substance as which the mass is counted.

        Raises
        ------
        FactMissing
            Something the unit needs is not known: output, hours, thrust, sulfur.
        """
        return self._si(pollutant, unit, reference_oxygen, oxygen_in_air, counted_as) / unit.factor

    def _si(
        self,
        pollutant: str,
        unit: EmissionUnit,
        reference_oxygen: float | None,
        oxygen_in_air: float,
        counted_as: str | None,
    ) -> float:
        if unit.kind in ("volume", "mass"):
            reference = unit.oxygen if unit.oxygen is not None else reference_oxygen
            return self._concentration(pollutant, unit, reference, oxygen_in_air, counted_as)
        if unit.kind == "fuel mass":
            return self._sulfur()
        if unit.kind == "thrust":
            if pollutant not in self.per_thrust:
                raise FactMissing(
                    "the four modes and the rated thrust",
                    "mass per thrust is of a whole landing and take-off cycle",
                )
            return self.per_thrust[pollutant]
        flow = self.mass_flow(pollutant, counted_as)
        if unit.kind == "index":
            return flow / self.fuel_flow
        if unit.kind == "heat":
            if unit.heat is None:
                raise FactMissing("LHV or HHV with the unit", f"{unit.text} leaves open which heat")
            return flow / (self.fuel_flow * self.heating_value(unit.heat))
        if unit.kind == "output":
            if not self.output:
                raise FactMissing("output", f"{unit.text} is per useful output")
            return flow / self.output
        if unit.kind == "year":
            if self.hours is None:
                raise FactMissing("hours", f"{unit.text} needs the hours operated a year")
            return flow * self.hours * SECONDS_PER_HOUR
        return flow

    def _concentration(
        self,
        pollutant: str,
        unit: EmissionUnit,
        reference: float | None,
        oxygen_in_air: float,
        counted_as: str | None,
    ) -> float:
        found = self.concentration(pollutant)
        oxygen = found.basis.oxygen.fraction
        if reference is not None:
            if oxygen is not None and oxygen > MAXIMUM_DRY_OXYGEN:
                raise FactMissing(
                    "a unit per heat or per fuel",
                    f"dry O2 is {100 * oxygen:.1f} %: a correction to {100 * reference:g} % is "
                    "not defined above 20 %",
                )
            found = found.at_oxygen(reference, oxygen_in_air)
        if unit.moisture == "wet":
            found = found.wet()
        if unit.kind == "mass" and unit.temperature is not None:
            found = found.as_mass(unit.temperature, counted_as)
        return found.value

    def _sulfur(self) -> float:
        if self.fuel_sulfur is None:
            raise FactMissing("fuel_sulfur", "sulfur of the fuel is not stated")
        return self.fuel_sulfur


def stack_of(
    emissions: Emissions,
    lower_heating_value: float,
    higher_heating_value: float,
    output: float | None = None,
    hours: float | None = None,
    fuel_sulfur: float | None = None,
    per_thrust: Mapping[str, float] | None = None,
) -> Stack:
    """Return the stack of a rated point; the sulfur oxides are added where sulfur is stated."""
    assert emissions.gas_flow is not None and emissions.fuel_flow is not None
    assert emissions.mean_molar_mass is not None
    wet = dict(emissions.wet)
    if fuel_sulfur is not None and emissions.fuel_flow > 0.0:
        oxides = sulfur_oxides(
            fuel_sulfur, emissions.gas_flow / emissions.fuel_flow, emissions.mean_molar_mass
        )
        wet |= {"SO2": oxides.so2, "SO3": oxides.so3}
    return Stack(
        wet=wet,
        gas_flow=emissions.gas_flow,
        fuel_flow=emissions.fuel_flow,
        molar_mass=emissions.mean_molar_mass,
        lower_heating_value=lower_heating_value,
        higher_heating_value=higher_heating_value,
        output=output,
        hours=hours,
        fuel_sulfur=fuel_sulfur,
        per_thrust=per_thrust or {},
    )
