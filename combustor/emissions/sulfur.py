"""Sulfur of the fuel in the exhaust: SO2, SO3."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.base.method import Method
from combustor.fuel.composition import ATOMIC_MASS

SULFUR_BALANCE = Method(
    key="sulfur-balance",
    quantity="SO2 from fuel sulfur",
    source="all sulfur of the fuel leaves as SO2 and SO3, 64.06/32.06 kg SO2 per kg",
    reading="derived",
)
SULFUR_TRIOXIDE_SHARE = Method(
    key="sulfur-trioxide-share",
    quantity="share of the sulfur that leaves as SO3",
    source="1 to 5 % of the sulfur; 2 % taken",
    reading="common practice, no source",
    validity={"share": (0.01, 0.05)},
)
SHARE_AS_SO3 = 0.02


@dataclass(frozen=True)
class SulfurOxides:
    """Mole fractions in the wet gas."""

    so2: float
    so3: float


def sulfur_oxides(
    fuel_sulfur: float, gas_per_fuel: float, gas_molar_mass: float, share: float = SHARE_AS_SO3
) -> SulfurOxides:
    """Return SO2 and SO3 of an exhaust.

    Parameters
    ----------
    fuel_sulfur : float
        Mass fraction of the fuel.
    gas_per_fuel : float
        Mass flow of wet gas per mass flow of fuel.
    gas_molar_mass : float
        kg/mol.
    share : float
        Of the sulfur, as SO3.

    Source
    ------
    ``SULFUR_BALANCE``, ``SULFUR_TRIOXIDE_SHARE``.
    """
    total = fuel_sulfur / ATOMIC_MASS["S"] * gas_molar_mass / gas_per_fuel
    return SulfurOxides(total * (1.0 - share), total * share)
