"""Records behind the tables of a compliance pre-check, for terminal, CSV and JSON alike."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from typing import Any

from combustor.emissions.dew_point import acid_dew_point, water_dew_point
from combustor.emissions.emission_unit import read_unit
from combustor.emissions.fuel_factor import DEFAULTS, FuelFactors, factors_of_fuel, per_heat
from combustor.emissions.pollutant import POLLUTANTS
from combustor.emissions.smoke import soot_trend
from combustor.emissions.stack import FactMissing, Stack
from combustor.report import permit_fields as fields
from combustor.report.document import Table
from combustor.studies.comply_record import ComplyCheck

COMPLY_TABLES = (
    "verdicts",
    "applicability",
    "gaps",
    "concentrations",
    "masses",
    "dew_points",
    "smoke",
    "fuel_factors",
)
SMOKE_TITLE = "Smoke, relative trend alone (within a factor of 3; no smoke number)"
_US_OXYGEN = 0.209
_NO_SMOKE = 0.18  # hydrogen by mass, where the trend ends
_CONCENTRATIONS = {
    "ppmvw": "ppmvw",
    "ppmvd": "ppmvd",
    "ppmvd_15": "ppmvd@15",
    "mg_nm3_15": "mg/Nm3@15",
    "mg_m3_15C_15": "mg/m3(15C)@15",
    "mg_m3_20C_15": "mg/m3(20C)@15",
}
_MASSES = {
    "ei_g_kg": "g/kg",
    "g_MJ_LHV": "g/MJ LHV",
    "ng_J_HHV": "ng/J HHV",
    "lb_MMBtu_HHV": "lb/MMBtu HHV",
    "g_kWh": "g/kWh",
    "lb_MWh": "lb/MWh",
    "kg_h": "kg/h",
    "t_yr": "t/yr",
}


def comply_data(check: ComplyCheck) -> tuple[Table, ...]:
    """Return the CSV tables."""
    return (
        Table("verdicts", "Verdicts", fields.VERDICTS, check.verdicts, lead=3),
        Table("applicability", "What binds", fields.STANDINGS, standing_records(check)),
        Table("gaps", "What would close the gap", fields.GAPS, gap_records(check)),
        Table("concentrations", "Concentrations", fields.CONCENTRATIONS, concentrations(check)),
        Table("masses", "Masses", fields.MASSES, masses(check)),
        Table("dew_points", "Dew points", fields.DEW_POINTS, dew_points(check)),
        Table("smoke", SMOKE_TITLE, fields.SMOKE, smoke_trend(check)),
        Table("fuel_factors", "Fuel factors", fields.FUEL_FACTORS, fuel_factors(check)),
    )


def standing_records(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return one line a set or row and reason."""
    return tuple(
        {
            "rule": s.rule,
            "row": s.row,
            "points": ", ".join(s.points),
            "binds": "cannot tell" if s.binds is None else "yes" if s.binds else "no",
            "why": s.why,
        }
        for s in check.standings
    )


def gap_records(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return one line a lever."""
    return tuple(
        {
            "pollutant": gap.pollutant,
            "point": gap.point,
            "rule": gap.rule,
            "row": gap.row,
            "factor": gap.factor,
            "what": remedy.what,
            "change": remedy.change,
            "note": remedy.note,
        }
        for gap in check.gaps
        for remedy in gap.remedies
    )


def concentrations(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return every pollutant as concentration, one line a point and pollutant."""
    return tuple(_lines(check, _CONCENTRATIONS))


def masses(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return every pollutant as mass per fuel, heat, output and time."""
    default = default_factors(check)
    found = []
    for line in _lines(check, _MASSES):
        value = None
        if default is not None:
            value = _by_default(check.stacks[line["point"]], line["pollutant"], default)
        found.append({**line, "lb_MMBtu_HHV_default": value})
    return tuple(found)


def dew_points(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return water and acid dew point of each exhaust at atmospheric pressure."""
    found = []
    for point, stack in check.stacks.items():
        water = stack.wet["H2O"]
        acid = acid_dew_point(water, stack.wet.get("SO3", 0.0))
        found.append(
            {
                "point": point,
                "h2o_percent_wet": 100.0 * water,
                "water_dew_point_degC": water_dew_point(water) - 273.15,
                "so2_ppmvd_15": _value(stack, "SO2", "ppmvd@15"),
                "so3_ppmvd_15": _value(stack, "SO3", "ppmvd@15"),
                "acid_dew_point_degC": None if acid is None else acid - 273.15,
            }
        )
    return tuple(found)


def smoke_trend(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return soot formation of a liquid fuel relative to the first burning point."""
    fuel = check.burnt
    if fuel.phase != "liquid" or fuel.hydrogen_mass_fraction >= _NO_SMOKE:
        return ()
    found: list[dict[str, Any]] = []
    first = None
    for rated in check.ratings.points:
        zone = next((z for z in rated.zones if z.temperature is not None), None)
        if rated.emissions is None or zone is None or zone.temperature is None:
            continue
        soot = soot_trend(
            zone.equivalence_ratio * fuel.stoichiometric_fuel_air_ratio,
            rated.inlet.pressure,
            rated.inlet.air_flow * zone.air_fraction,
            zone.temperature,
            fuel.hydrogen_mass_fraction,
        )
        first = soot if first is None else first
        found.append({"point": rated.name, "relative_soot": soot / first})
    return tuple(found)


def fuel_factors(check: ComplyCheck) -> tuple[dict[str, Any], ...]:
    """Return the fuel's own factors and the regulation's default beside them."""
    own = factors_of_fuel(check.burnt.atoms, check.burnt.higher_heating_value)
    return factor_records(own, default_factors(check))


def factor_records(own: FuelFactors, default: FuelFactors | None) -> tuple[dict[str, Any], ...]:
    """Return computed and default factors, one line each."""
    found = []
    for words, factors in (("computed for this fuel", own), ("default by regulation", default)):
        if factors is None:
            continue
        dry, wet, carbon_dioxide = factors.in_scf()
        found.append(
            {
                "factor": words,
                "dry": dry,
                "wet": wet,
                "carbon_dioxide": carbon_dioxide,
                "dry_si": factors.dry,
                "wet_si": factors.wet,
                "carbon_dioxide_si": factors.carbon_dioxide,
            }
        )
    return tuple(found)


def default_factors(check: ComplyCheck) -> FuelFactors | None:
    """Return the regulation's factors for the fuel's class; None where its table has none."""
    seen = check.facts.values.get("fuel")
    return DEFAULTS.get({"natural-gas": "natural-gas", "gas-oil": "oil"}.get(str(seen), ""))


def _by_default(stack: Stack, pollutant: str, factors: FuelFactors) -> float | None:
    mass = _value(stack, pollutant, "mg/m3(20C)@15", _US_OXYGEN)
    if mass is None:
        return None
    unit = read_unit("lb/MMBtu HHV")
    return per_heat(mass * 1e-6, factors.dry, 0.15, _US_OXYGEN) / unit.factor


def _lines(check: ComplyCheck, columns: dict[str, str]) -> Iterator[dict[str, Any]]:
    for point, stack in check.stacks.items():
        for pollutant in _known(stack):
            values = {key: _value(stack, pollutant, unit) for key, unit in columns.items()}
            yield {"point": point, "pollutant": pollutant, **values}


def _known(stack: Stack) -> Iterable[str]:
    for pollutant in POLLUTANTS:
        try:
            stack.fraction(pollutant)
        except FactMissing:
            continue
        yield pollutant


def _value(
    stack: Stack, pollutant: str, unit: str, oxygen_in_air: float | None = None
) -> float | None:
    try:
        if oxygen_in_air is None:
            return stack.express(pollutant, read_unit(unit))
        return stack.express(pollutant, read_unit(unit), None, oxygen_in_air)
    except FactMissing:
        return None
