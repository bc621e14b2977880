"""What counts as burning: a stream against what it takes in, a zone against its fresh inflow."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from combustor.fuel.gas import Gas
from combustor.kinetics.zone import Zone, ZoneState

Array = NDArray[np.float64]

BURNING_SHARE = 0.35  # of the rise from inlet to equilibrium temperature
NEGLIGIBLE_HEAT = 150.0  # K of temperature rise still to come: burnt, without asking equilibrium
NEGLIGIBLE_RISE = 50.0  # K from inlet to equilibrium: nothing to ignite
LEAST_HEAT_CAPACITY = 1100.0  # J/(kg K), below that of combustion gas above 700 K


def mean_temperature(zone: Zone, state: ZoneState) -> float:
    """Return the mass-mean temperature [K]."""
    return float(zone.shares @ state.temperatures)


def inlet_temperature(zone: Zone) -> float:
    """Return the temperature of the whole fresh inflow, mixed and unburnt [K]."""
    masses = zone.mean_moles * zone.gas.rates.molar_masses
    return zone.gas.temperature(zone.mean_enthalpy, zone.pressure, masses)


def burning_temperature(zone: Zone) -> float:
    """Return the mass-mean temperature above which the zone as a whole counts as burning [K].

    A mixture that could hardly warm itself has to warm by a share of the least rise that counts.
    """
    gas = zone.gas
    inlet = inlet_temperature(zone)
    masses = zone.mean_moles * gas.rates.molar_masses
    hottest = gas.equilibrium(zone.exit_enthalpy, zone.pressure, masses).temperature
    return inlet + BURNING_SHARE * max(hottest - inlet, NEGLIGIBLE_RISE)


def zone_burns(zone: Zone, state: ZoneState) -> bool:
    """Say whether the mean temperature has left the fresh inflow's far enough behind."""
    return mean_temperature(zone, state) > burning_temperature(zone)


def burning_streams(zone: Zone, state: ZoneState) -> NDArray[np.bool_]:
    """Say of every stream whether it burns, against what it takes in.

    A stream whose products hold no more heat to release, or whose inflow had none, counts as
    burning: there is no hotter branch it could be on.
    """
    gas = zone.gas
    inlets = zone.inlets(zone.shares @ state.moles, state.rate)
    enthalpies = zone.inlet_enthalpies(state.rate)
    verdicts = np.ones(zone.streams, dtype=bool)
    for place in range(zone.streams):
        if _rise_to_come(gas, state.moles[place]) < NEGLIGIBLE_HEAT:
            continue
        masses = inlets[place] * gas.rates.molar_masses
        enthalpy = float(enthalpies[place])
        inlet = gas.temperature(enthalpy, zone.pressure, masses)
        leaving = enthalpy - zone.loss_per_pass
        rise = gas.equilibrium(leaving, zone.pressure, masses).temperature - inlet
        enough = inlet + BURNING_SHARE * rise
        verdicts[place] = rise < NEGLIGIBLE_RISE or bool(state.temperatures[place] > enough)
    return verdicts


def all_burn(zone: Zone, state: ZoneState) -> bool:
    """Say whether every stream burns."""
    return bool(burning_streams(zone, state).all())


def count_burning(zone: Zone, state: ZoneState) -> int:
    """Return how many streams burn."""
    return int(np.count_nonzero(burning_streams(zone, state)))


def _rise_to_come(gas: Gas, moles: Array) -> float:
    """Return the temperature rise of complete combustion of what is left, at most [K]."""
    burnable = gas.oxygen_demands > 0.0
    needed = float((gas.oxygen_demands * moles)[burnable].sum())
    if needed <= 0.0:
        return 0.0
    free = max(float(moles[gas.index("O2")]), 0.0)
    heat = float((gas.combustion_heats * moles)[burnable].sum()) * 1000.0
    return heat * min(1.0, free / needed) / LEAST_HEAT_CAPACITY
