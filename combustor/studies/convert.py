"""One emission from the basis it was measured on to others, every step kept."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Literal

from combustor.emissions.bases import REFERENCE_OXYGEN
from combustor.emissions.concentration import (
    Basis,
    Concentration,
    OxygenState,
    mean,
    measured,
)
from combustor.emissions.emission_unit import US_STANDARD, EmissionUnit
from combustor.emissions.fuel_class import standing
from combustor.emissions.fuel_factor import (
    DEFAULTS,
    FuelFactors,
    concentration_of_heat,
    factors_of_fuel,
    per_heat,
)
from combustor.emissions.hydrogen_reading import apparent_factor
from combustor.emissions.pollutant import Pollutant, find
from combustor.emissions.reference_day import REFERENCE_PRESSURE, iso_factor
from combustor.fuel.record import Fuel
from combustor.studies.convert_reading import impossible, lacking, per_run, read_value, units_of
from combustor.studies.convert_record import (
    Conversion,
    Moisture,
    Plant,
    Result,
    Sample,
    Step,
)


def convert(
    values: Sequence[str],
    species: str,
    fuel: Fuel,
    to: Sequence[str],
    sample: Sample | None = None,
    plant: Plant | None = None,
) -> Conversion:
    """Take one emission, measured in one or several runs, to other bases.

    Each run is dried and brought to 15 % O2 before runs are averaged.

    Parameters
    ----------
    values : sequence of str
        One a run: a number (ppm), or a number with a unit.
    species : str
    fuel : Fuel
    to : sequence of str
        Units wanted.
    sample : Sample, optional
    plant : Plant, optional

    Raises
    ------
    InputError
        Every value, unit or missing piece that cannot be used.
    """
    sample, plant = sample or Sample(), plant or Plant()
    pollutant = find(species)
    oxygen = per_run(sample.oxygen, len(values))
    own = factors_of_fuel(fuel.atoms, fuel.higher_heating_value)
    work = _Work(pollutant, fuel, own, sample, plant)
    units = units_of(to)
    runs, corrected = [], []
    for value, o2 in zip(values, oxygen, strict=True):
        steps, concentration = work.run(value, o2)
        runs.append(steps)
        corrected.append(concentration)
    average = mean(corrected)
    default = DEFAULTS.get(_default_class(fuel))
    results = [found for unit in units for found in work.results(average, unit, default)]
    return Conversion(
        species=pollutant.name,
        fuel=fuel.name,
        oxygen_in_air=sample.oxygen_in_air,
        runs=tuple(runs),
        mean=average.value,
        results=tuple(results),
        own=own,
        default=default,
        notes=_notes(fuel, pollutant, default),
    )


@dataclass(frozen=True)
class _Work:
    pollutant: Pollutant
    fuel: Fuel
    own: FuelFactors
    sample: Sample
    plant: Plant

    def run(self, text: str, oxygen: float | None) -> tuple[tuple[Step, ...], Concentration]:
        """Return the steps of one run, and it dry at 15 % O2."""
        number, unit, moisture = read_value(text, self.sample.moisture)
        steps = [Step("as given", number, unit.text)]
        si = number * unit.factor
        in_air = self.sample.oxygen_in_air
        if unit.concentration:
            found = self._concentration(si, unit, moisture, oxygen)
            steps += self._drying(found, oxygen)
            found = found.dry()
            if found.basis.temperature is not None:
                found = found.as_fraction()
                steps.append(Step("by volume", found.value * 1e6, "ppmvd"))
            found = found.at_oxygen(REFERENCE_OXYGEN, in_air)
            steps.append(Step("at 15 % O2, dry", found.value * 1e6, "ppmvd@15"))
            return tuple(steps), found
        heat = self._per_heat(si, unit, steps)
        cubic = concentration_of_heat(heat, self.own.dry, REFERENCE_OXYGEN, in_air)
        state = OxygenState(REFERENCE_OXYGEN, in_air)
        name, counted = self.pollutant.name, self.pollutant.counted_as
        mass = Concentration(cubic, Basis(name, counted, "dry", state, US_STANDARD))
        found = mass.as_fraction()
        steps.append(
            Step("dry, at 15 % O2, by the fuel's own factor", found.value * 1e6, "ppmvd@15")
        )
        return tuple(steps), found

    def _concentration(
        self, value: float, unit: EmissionUnit, moisture: Moisture, oxygen: float | None
    ) -> Concentration:
        name, water = self.pollutant.name, self.sample.water
        if unit.oxygen is not None:
            state = OxygenState(unit.oxygen, self.sample.oxygen_in_air)
            counted = self.pollutant.counted_as
            if moisture == "wet" and water is None:
                raise lacking("--moisture", f"{unit.text} is wet")
            basis = Basis(name, counted, moisture, state, unit.temperature, water)
            return Concentration(value, basis)
        if oxygen is None:
            raise lacking("--o2", f"{unit.text} names no O2, and none was given")
        found = measured(value, name, oxygen, moisture, self.sample.oxygen_moisture, water)
        return replace(found, basis=replace(found.basis, temperature=unit.temperature))

    def _drying(self, found: Concentration, oxygen: float | None) -> list[Step]:
        steps = []
        dry_oxygen = found.basis.oxygen.fraction
        as_found = found.basis.oxygen.in_air is None
        if as_found and oxygen is not None and dry_oxygen is not None:
            if dry_oxygen != oxygen:
                steps.append(Step("O2 as measured, wet", 100.0 * oxygen, "%"))
            steps.append(Step("O2, dry", 100.0 * dry_oxygen, "%"))
        if found.basis.moisture == "wet" and found.basis.temperature is None:
            steps.append(Step("dried", found.dry().value * 1e6, "ppmvd"))
        return steps

    def _per_heat(self, value: float, unit: EmissionUnit, steps: list[Step]) -> float:
        """Return kg per J of higher heating value."""
        lower, higher = self.fuel.lower_heating_value, self.fuel.higher_heating_value
        if unit.kind == "heat":
            if unit.heat is None:
                raise lacking("LHV or HHV with the value", f"{unit.text} leaves open which heat")
            heat = value * (lower / higher if unit.heat == "LHV" else 1.0)
        elif unit.kind == "index":
            heat = value / higher
        elif unit.kind == "output":
            heat = value * self._need("output") / (self._need("heat_input") * higher / lower)
        elif unit.kind == "rate":
            heat = value / (self._need("heat_input") * higher / lower)
        elif unit.kind == "year":
            seconds = self._need("hours") * 3600.0
            heat = value / seconds / (self._need("heat_input") * higher / lower)
        else:
            raise impossible(unit)
        steps.append(Step("per heat", heat * 1e12, "ng/J HHV"))
        return heat

    def results(
        self, average: Concentration, unit: EmissionUnit, default: FuelFactors | None
    ) -> list[Result]:
        """Return the mean in one unit; two where heat or fuel factor leave a choice."""
        if unit.concentration:
            found = [self._as_concentration(average, unit)]
        elif unit.kind == "heat" and unit.heat is None:
            both: tuple[Literal["LHV", "HHV"], ...] = ("LHV", "HHV")
            found = [
                self._through_heat(average, replace(unit, heat=h, text=f"{unit.text} {h}"))
                for h in both
            ]
        else:
            found = [self._through_heat(average, unit)]
            if unit.kind == "heat" and unit.heat == "HHV" and default is not None:
                found.append(self._through_heat(average, unit, default))
        if self.plant.ambient is not None and self.pollutant.name == "NOx":
            factor = self._iso()
            found += [
                Result(r.unit, r.value * factor, _join(r.note, f"at the ISO day, x {factor:.4f}"))
                for r in found
            ]
        return found

    def _iso(self) -> float:
        air = self.plant.ambient
        assert air is not None
        ratio = REFERENCE_PRESSURE / air.pressure
        return iso_factor(air.humidity, air.temperature, ratio, self.plant.front_end)

    def _as_concentration(self, average: Concentration, unit: EmissionUnit) -> Result:
        reference = REFERENCE_OXYGEN if unit.oxygen is None else unit.oxygen
        note = "" if unit.oxygen is not None else "no O2 named: at 15 %"
        found = average.at_oxygen(reference, self.sample.oxygen_in_air)
        if unit.moisture == "wet":
            if found.basis.water is None:
                raise lacking("--moisture", f"{unit.text} is wet")
            found = found.wet()
        if unit.temperature is not None:
            found = found.as_mass(unit.temperature)
            note = _join(note, f"as {found.basis.counted_as}")
        return Result(unit.text, found.value / unit.factor, note)

    def _through_heat(
        self, average: Concentration, unit: EmissionUnit, default: FuelFactors | None = None
    ) -> Result:
        factors = default or self.own
        mass = average.as_mass(US_STANDARD)
        heat = per_heat(mass.value, factors.dry, REFERENCE_OXYGEN, self.sample.oxygen_in_air)
        lower, higher = self.fuel.lower_heating_value, self.fuel.higher_heating_value
        if unit.kind == "heat":
            value = heat * (higher / lower if unit.heat == "LHV" else 1.0)
        elif unit.kind == "index":
            value = heat * higher
        elif unit.kind == "output":
            value = heat * self._need("heat_input") * higher / lower / self._need("output")
        elif unit.kind in ("rate", "year"):
            value = heat * self._need("heat_input") * higher / lower
            if unit.kind == "year":
                value *= self._need("hours") * 3600.0
        else:
            raise impossible(unit)
        word = "default" if default is not None else "own"
        note = f"{word} Fd {factors.in_scf()[0]:.0f} dscf/MMBtu, as {self.pollutant.counted_as}"
        return Result(unit.text, value / unit.factor, note)

    def _need(self, name: str) -> float:
        value = getattr(self.plant, name)
        if value is None:
            option = "--" + name.replace("_", "-")
            raise lacking(option, f"this unit needs the {name.replace('_', ' ')}")
        return float(value)


def _default_class(fuel: Fuel) -> str:
    """Return the class under which the regulation's table lists a fuel; empty where none."""
    seen = standing(fuel.name, fuel.phase, fuel.composition)
    if seen.fuel_class == "natural-gas":
        return "natural-gas"
    if seen.fuel_class == "gas-oil":
        return "oil"
    main = max(fuel.composition, key=lambda name: fuel.composition[name]).upper()
    whole = fuel.composition[max(fuel.composition, key=lambda n: fuel.composition[n])] > 0.9
    return {"C3H8": "propane", "C4H10": "butane"}.get(main, "") if whole else ""


def _notes(fuel: Fuel, pollutant: Pollutant, default: FuelFactors | None) -> tuple[str, ...]:
    notes = []
    if default is None:
        notes.append("the regulation's table has no default fuel factor for this fuel")
    hydrogen = fuel.composition.get("H2", 0.0)
    if hydrogen > 0.0:
        factor = apparent_factor(fuel.atoms, fuel.lower_heating_value * fuel.molar_mass)
        notes.append(
            f"with {100 * hydrogen:.4g} % hydrogen by volume a concentration at a reference O2 "
            f"reads {factor:.3f} times what methane would at the same mass per heat (LHV)"
        )
    if pollutant.name == "NO":
        notes.append("NO by itself, as NO: limits on NOx count NO and NO2, as NO2 (mass x 1.533)")
    return tuple(notes)


def _join(*parts: str) -> str:
    return "; ".join(part for part in parts if part)
