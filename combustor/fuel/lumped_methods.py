"""The methods a fuel with lumped species stands on, for the table of sources."""

from __future__ import annotations

from combustor.base.method import Method
from combustor.fuel.certificate import HEAT_FROM_ELEMENTS, LATENT_HEAT
from combustor.fuel.cracking import BOND_SCISSION, HYDROGEN_ABSTRACTION, LUMPED_CRACKING
from combustor.fuel.heavier import HEAVIER_GASES
from combustor.fuel.liquids import BENZENE_OF_AROMATICS, LIQUID_ENTHALPY
from combustor.fuel.lumped import parted
from combustor.fuel.lumped_thermo import LUMPED_FORMATION, LUMPED_HEAT_CAPACITY
from combustor.fuel.record import Fuel


def lumped_methods(fuel: Fuel) -> tuple[Method, ...]:
    """Return the methods behind the lumped species of a fuel; none for a plain gas."""
    _, lumps = parted(fuel.mechanism)
    found: list[Method] = []
    if fuel.liquid is not None:
        found.append(LIQUID_ENTHALPY)
    if lumps:
        found += [LUMPED_CRACKING, HYDROGEN_ABSTRACTION, BOND_SCISSION]
        certified = any(lump.name.startswith("LIQUID-") for lump in lumps)
        found += (
            [LUMPED_HEAT_CAPACITY, LUMPED_FORMATION, HEAT_FROM_ELEMENTS, LATENT_HEAT]
            if certified
            else [HEAVIER_GASES]
        )
        if certified:
            found.append(BENZENE_OF_AROMATICS)
    return tuple(found)
