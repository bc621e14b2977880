"""Liquid fuels: certificate to lumped species, and the enthalpy of a fuel as it is supplied."""

from __future__ import annotations

from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.fuel.certificate import Certificate
from combustor.fuel.cracking import Shares
from combustor.fuel.gas import STANDARD_TEMPERATURE, Gas
from combustor.fuel.lumped import Lump
from combustor.fuel.lumped_thermo import vapour_of
from combustor.fuel.record import Fuel, Liquid

BENZENE_OF_AROMATICS = Method(
    key="benzene-share",
    quantity="carbon that cracks to benzene, over aromatics by volume",
    source="tuned with the other shares to stirred reactors of Jet A; scaled with aromatics",
    reading="computed",
)
LIQUID_ENTHALPY = Method(
    key="liquid-fuel-enthalpy",
    quantity="enthalpy of liquid fuel as it is injected",
    source="vapour at 15 degC less latent heat, plus liquid heat capacity times temperature rise",
    reading="derived",
    validity={"temperature": (220.0, 550.0)},
)

# tuned, see LUMPED_CRACKING
JET_A_AROMATICS = 0.17
BENZENE = 0.13
TUNED = Shares(benzene=BENZENE, propene=0.367, methane=0.127, methyl=0.2, attack=0.75, scission=1.4)

LIQUID_TEMPERATURES = (200.0, 600.0)  # K; beyond, no fuel here is a liquid


def lump_of(name: str, certificate: Certificate) -> Lump:
    """Return the lumped species of a certificate.

    Parameters
    ----------
    name : str
        Of the fuel; the species is called by its letters and digits, upper case.
    certificate : Certificate
    """
    atoms = certificate.atoms
    heat = (certificate.net_heating_value + certificate.latent) * certificate.mole
    vapour = vapour_of(atoms, heat)
    benzene = BENZENE * certificate.aromatic_volume / JET_A_AROMATICS
    shares = Shares(
        min(benzene, 0.9), TUNED.propene, TUNED.methane, TUNED.methyl, TUNED.attack, TUNED.scission
    )
    species = "".join(letter for letter in name.upper() if letter.isalnum()) or "FUEL"
    return Lump(f"LIQUID-{species}", atoms, vapour.ranges, vapour.low, vapour.high, shares)


def liquid_of(certificate: Certificate) -> Liquid:
    """Return the liquid's own properties."""
    return Liquid(
        density=certificate.density,
        latent_heat=certificate.latent,
        heat_capacity=certificate.heat_capacity,
        viscosity=certificate.viscosity,
        surface_tension=certificate.surface_tension,
        sulfur=certificate.sulfur,
        nitrogen=certificate.nitrogen,
        aromatics=certificate.aromatic_volume,
    )


def supplied_enthalpy(gas: Gas, fuel: Fuel, temperature: float, pressure: float) -> float:
    """Return the enthalpy of a fuel as it is supplied, formation included.

    Parameters
    ----------
    gas : Gas
    fuel : Fuel
    temperature : float
        Of the gas, or of the liquid, K.
    pressure : float
        Pa.

    Returns
    -------
    float
        J/kg; a liquid's lacks the latent heat, which the air then provides.

    Raises
    ------
    InputError
        A liquid hotter or colder than any liquid.

    Source
    ------
    ``LIQUID_ENTHALPY``.
    """
    fractions = gas.fuel(fuel)
    if fuel.liquid is None:
        return gas.enthalpy(temperature, pressure, fractions)
    low, high = LIQUID_TEMPERATURES
    if not low <= temperature <= high:
        raise InputError(
            Problem(
                f"{fuel.name} is not a liquid at this temperature",
                key="fuel temperature",
                value=temperature,
                allowed=f"{low:g} to {high:g} K for a liquid fuel",
            )
        )
    vapour = gas.enthalpy(STANDARD_TEMPERATURE, pressure, fractions)
    warming = fuel.liquid.heat_capacity * (temperature - STANDARD_TEMPERATURE)
    return vapour - fuel.liquid.latent_heat + warming
