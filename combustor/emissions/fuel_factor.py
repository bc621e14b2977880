"""Fuel factors: dry, wet and CO2 gas volume per heat, and emission per heat through them."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.emissions.bases import OXYGEN_IN_AIR, dry_exhaust_per_fuel
from combustor.emissions.emission_unit import BTU, POUND, US_STANDARD
from combustor.fuel.composition import molar_mass, oxygen_demand
from combustor.fuel.wobbe import molar_volume

CUBIC_FOOT = 0.3048**3  # m3
SCF_PER_MMBTU = CUBIC_FOOT / (1e6 * BTU)  # m3/J of one scf/MMBtu
POUND_PER_SCF = POUND / CUBIC_FOOT  # kg/m3
US_OXYGEN_IN_AIR = 0.209

STOICHIOMETRIC_FACTOR = Method(
    key="fuel-factor-stoichiometric",
    quantity="gas volume of stoichiometric combustion per higher heating value",
    source="element balance with dry air of 20.95 % O2, ideal gas at 68 degF and 29.92 inHg",
    reading="derived",
)
ANALYSIS_FACTOR = Method(
    key="fuel-factor-ultimate-analysis",
    quantity="fuel factors from the ultimate analysis and gross calorific value",
    source="40 CFR 60 appendix A, Method 19, equations 19-13 to 19-15",
    reading="from memory",
    note="dry coefficients reproduce a published stack-test example; wet and CO2 ones are memory",
)
DEFAULT_FACTORS = Method(
    key="fuel-factor-default",
    quantity="default fuel factors by kind of fuel",
    source="40 CFR 60 appendix A, Method 19, table 19-2; dry and CO2 columns read in a copy of "
    "40 CFR 75 appendix F, wet column of gas and oil in a copy, of propane and butane from memory",
    reading="as given in",
)
RATE_EQUATIONS = Method(
    key="emission-rate-method-19",
    quantity="emission per heat from a concentration and O2 or CO2",
    source="40 CFR 60 appendix A, Method 19, equations 19-1 to 19-7",
    reading="from memory",
    note="dry and CO2 forms also seen in copies of 40 CFR 75",
)


@dataclass(frozen=True)
class FuelFactors:
    """Gas volumes per higher heating value, m3/J at 68 degF and 29.92 inHg.

    ``dry`` and ``wet``: all products of stoichiometric combustion; ``carbon_dioxide`` alone.
    """

    dry: float
    wet: float
    carbon_dioxide: float
    source: str = ""

    def in_scf(self) -> tuple[float, float, float]:
        """Return the three in scf/MMBtu."""
        return (
            self.dry / SCF_PER_MMBTU,
            self.wet / SCF_PER_MMBTU,
            self.carbon_dioxide / SCF_PER_MMBTU,
        )


def _default(dry: float, wet: float, carbon_dioxide: float) -> FuelFactors:
    return FuelFactors(
        dry * SCF_PER_MMBTU, wet * SCF_PER_MMBTU, carbon_dioxide * SCF_PER_MMBTU, "default"
    )


# by fuel class of the rules; scf/MMBtu as printed
DEFAULTS: Mapping[str, FuelFactors] = {
    "natural-gas": _default(8710.0, 10610.0, 1040.0),
    "propane": _default(8710.0, 10200.0, 1190.0),
    "butane": _default(8710.0, 10390.0, 1250.0),
    "oil": _default(9190.0, 10320.0, 1420.0),
}


def dry_products(atoms: Mapping[str, float]) -> float:
    """Return mol of dry gas that one mol of fuel leaves beside the air's own: CO2, SO2, N2."""
    dry = atoms.get("C", 0.0) + atoms.get("S", 0.0) + 0.5 * atoms.get("N", 0.0)
    return dry + atoms.get("Ar", 0.0) + atoms.get("He", 0.0)


def factors_of_fuel(atoms: Mapping[str, float], higher_heating_value: float) -> FuelFactors:
    """Return the fuel's own factors.

    Parameters
    ----------
    atoms : mapping of str to float
        Per mean molecule of the fuel.
    higher_heating_value : float
        J/kg.

    Source
    ------
    ``STOICHIOMETRIC_FACTOR``.
    """
    heat = higher_heating_value * molar_mass(atoms)
    oxygen = oxygen_demand(atoms)
    dry = dry_exhaust_per_fuel(oxygen, dry_products(atoms), 0.0, OXYGEN_IN_AIR)
    water = 0.5 * atoms.get("H", 0.0)
    volume = molar_volume(US_STANDARD) / heat
    return FuelFactors(
        dry * volume, (dry + water) * volume, atoms.get("C", 0.0) * volume, "computed"
    )


def factors_of_analysis(
    mass_percent: Mapping[str, float], gross_heating_value: float
) -> FuelFactors:
    """Return factors from an ultimate analysis.

    Parameters
    ----------
    mass_percent : mapping of str to float
        C, H, S, N, O and (for the wet factor) H2O, percent of the fuel's mass.
    gross_heating_value : float
        J/kg.

    Source
    ------
    ``ANALYSIS_FACTOR``.
    """
    unknown = sorted(set(mass_percent) - {"C", "H", "S", "N", "O", "H2O"})
    if unknown:
        raise InputError(
            Problem(
                "not in an ultimate analysis",
                "C, H, S, N, O, H2O",
                "mass_percent",
                ", ".join(unknown),
            )
        )
    btu_per_pound = gross_heating_value * POUND / BTU
    get = mass_percent.get
    rest = 1.53 * get("C", 0.0) + 0.57 * get("S", 0.0) + 0.14 * get("N", 0.0)
    rest -= 0.46 * get("O", 0.0)
    scale = 1e6 / btu_per_pound * SCF_PER_MMBTU
    hydrogen = get("H", 0.0)
    return FuelFactors(
        scale * (3.64 * hydrogen + rest),
        scale * (5.57 * hydrogen + rest + 0.21 * get("H2O", 0.0)),
        scale * 0.321 * get("C", 0.0),
        "ultimate analysis",
    )


def per_heat(
    concentration: float, dry_factor: float, oxygen: float, in_air: float = US_OXYGEN_IN_AIR
) -> float:
    """Return kg per J of higher heating value from a dry concentration and dry O2.

    Parameters
    ----------
    concentration : float
        kg per dry m3 at 68 degF.
    dry_factor : float
        m3/J.
    oxygen : float
        Dry mole fraction.
    in_air : float

    Source
    ------
    ``RATE_EQUATIONS``.
    """
    _check(oxygen, in_air)
    return concentration * dry_factor * in_air / (in_air - oxygen)


def concentration_of_heat(
    mass_per_heat: float, dry_factor: float, oxygen: float, in_air: float = US_OXYGEN_IN_AIR
) -> float:
    """Return the dry concentration (kg/m3 at 68 degF); inverse of `per_heat`."""
    _check(oxygen, in_air)
    return mass_per_heat / (dry_factor * in_air / (in_air - oxygen))


def per_heat_wet(
    concentration: float,
    dry_factor: float,
    oxygen_wet: float,
    water: float,
    in_air: float = US_OXYGEN_IN_AIR,
) -> float:
    """Return kg per J from a wet concentration, wet O2 and the stack's own moisture."""
    _check(oxygen_wet, in_air * (1.0 - water))
    return concentration * dry_factor * in_air / (in_air * (1.0 - water) - oxygen_wet)


def per_heat_by_carbon_dioxide(
    concentration: float, carbon_dioxide_factor: float, carbon_dioxide: float
) -> float:
    """Return kg per J from a dry concentration and dry CO2 (mole fraction)."""
    return concentration * carbon_dioxide_factor / carbon_dioxide


def fuel_ratio(factors: FuelFactors, in_air: float = US_OXYGEN_IN_AIR) -> float:
    """Return Fo, by which O2 and CO2 readings of one gas are checked against each other."""
    return in_air * factors.dry / factors.carbon_dioxide


def _check(oxygen: float, in_air: float) -> None:
    if not 0.0 <= oxygen < in_air:
        raise InputError(
            Problem(
                "O2 of the exhaust outside zero to that of air",
                f"give a mole fraction below {in_air:g}",
                "oxygen",
                oxygen,
            )
        )
