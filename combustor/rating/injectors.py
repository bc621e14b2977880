"""Each injector's own fuel and air in the primary zone, from the solved air split."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np

from combustor.airflow.result import AirSplit
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method
from combustor.hardware.metal import Hardware, Injector
from combustor.kinetics.unmixedness import Distribution, beta_streams
from combustor.rating.entry import Entry
from combustor.rating.operating import Operating
from combustor.rating.settings import Settings

PREMIXED_UNMIXEDNESS = Method(
    key="unmixedness-premixed",
    quantity="standard deviation of mixture fraction over its mean behind a premixer",
    source="lean premixed burners: 0.03 to 0.10 well mixed, 0.1 to 0.2 poorly",
    reading="from memory",
    validity={"unmixedness": (0.0, 0.2)},
    scatter="the calibration parameter of a machine",
    note="0.06 taken for an injector that mixes ahead of the dome",
)
INJECTOR_AIR = Method(
    key="injector-air",
    quantity="equivalence ratio of each injector",
    source="its fuel over the air its own openings pass; primary air of openings that no injector "
    "names is shared by fuel",
    reading="judgement",
    note="mean products come back to all injectors alike",
)

WELL_MIXED = 0.06
LEAST_STREAMS = 3


@dataclass(frozen=True)
class InjectorAir:
    """What one injector burns.

    Parameters
    ----------
    name : str
    fuel_share : float
        Of all fuel [-]
    own_air, all_air : float
        Through its own openings, and with its share of what no injector names [kg/s]
    equivalence_ratio : float
        Of its fuel in its own air; in all its air where it has no opening of its own [-]
    primary_equivalence_ratio : float
        In all its air [-]
    unmixedness : float
        [-]
    is_premixed : bool
    """

    name: str
    fuel_share: float
    own_air: float
    all_air: float
    equivalence_ratio: float
    primary_equivalence_ratio: float
    unmixedness: float
    is_premixed: bool


def fuel_shares(
    injectors: Sequence[Injector], fuel_split: Mapping[str, float] | None, point: str
) -> dict[str, float]:
    """Return each injector's share of the fuel at a point: stated there, else the metal's.

    Raises
    ------
    InputError
        The point names an injector the metal has not.
    """
    if fuel_split is None:
        return {injector.name: injector.share for injector in injectors}
    known = [injector.name for injector in injectors]
    strange = [name for name in fuel_split if name not in known]
    if strange:
        raise InputError(
            [
                Problem(
                    "no such injector",
                    f"the metal has {', '.join(known) or 'none'}",
                    f"fuel_split of point {point}",
                    name,
                )
                for name in strange
            ]
        )
    return {name: fuel_split.get(name, 0.0) for name in known}


def is_premixed(injector: Injector, hardware: Hardware) -> bool:
    """Whether an injector's fuel and air mix ahead of the dome."""
    roles = {opening.role for opening in hardware.openings if opening.name in injector.openings}
    return injector.premix_length is not None or "premixer" in roles


def injectors_of(
    operating: Operating,
    hardware: Hardware,
    split: AirSplit,
    entries: Sequence[Entry],
    fuel_flow: float,
    settings: Settings,
) -> tuple[InjectorAir, ...]:
    """Return what every injector burns, as the air splits.

    Parameters
    ----------
    operating : Operating
    hardware : Hardware
    split : AirSplit
    entries : sequence of Entry
        Of the openings, in the metal's order.
    fuel_flow : float
        [kg/s]
    settings : Settings
    """
    shares = fuel_shares(hardware.injectors, operating.fuel_split, operating.name)
    air = {
        flow.name: flow.mass_flow * entry.primary
        for flow, entry in zip(split.openings, entries, strict=True)
    }
    # an opening that several injectors name is theirs in equal parts
    named = [name for injector in hardware.injectors for name in injector.openings]
    unnamed = sum(flow for name, flow in air.items() if name not in named)
    found = []
    for injector in hardware.injectors:
        share = shares[injector.name]
        own = sum(air[name] / named.count(name) for name in injector.openings)
        whole = own + unnamed * share
        premixed = is_premixed(injector, hardware)
        found.append(
            InjectorAir(
                name=injector.name,
                fuel_share=share,
                own_air=own,
                all_air=whole,
                equivalence_ratio=_equivalence_ratio(operating, share * fuel_flow, own or whole),
                primary_equivalence_ratio=_equivalence_ratio(operating, share * fuel_flow, whole),
                unmixedness=_unmixedness(settings, premixed),
                is_premixed=premixed,
            )
        )
    return tuple(found)


def streams_of(
    injectors: Sequence[InjectorAir], fuel_flow: float, water_flow: float, streams: int
) -> Distribution | None:
    """Return the streams of a primary zone that several injectors feed.

    Parameters
    ----------
    injectors : sequence of InjectorAir
    fuel_flow, water_flow : float
        Water enters with the fuel [kg/s]
    streams : int
        Streams altogether, about.

    Returns
    -------
    Distribution or None
        None where one injector or none feeds the zone: its own width says it all.
    """
    burning = [one for one in injectors if one.all_air > 0.0 or one.fuel_share > 0.0]
    if len(burning) < 2:
        return None
    injected = fuel_flow + water_flow
    masses = np.array([one.fuel_share * injected + one.all_air for one in burning])
    fractions: list[float] = []
    weights: list[float] = []
    for one, mass in zip(burning, (masses / masses.sum()).tolist(), strict=True):
        mean = one.fuel_share * injected / (one.fuel_share * injected + one.all_air)
        if not 0.0 < mean < 1.0:
            part = Distribution(np.array([mean]), np.ones(1))
        else:
            count = max(LEAST_STREAMS, round(streams * mass))
            part = beta_streams(mean, one.unmixedness, count)
        fractions += part.mixture_fractions.tolist()
        weights += (mass * part.shares).tolist()
    order = np.argsort(fractions, kind="stable")
    return Distribution(np.array(fractions)[order], np.array(weights)[order])


def width_of(injectors: Sequence[InjectorAir], settings: Settings) -> float:
    """Return the unmixedness of a primary zone that one injector or none feeds [-]."""
    burning = [one for one in injectors if one.all_air > 0.0 or one.fuel_share > 0.0]
    return burning[0].unmixedness if len(burning) == 1 else settings.unmixedness


def _unmixedness(settings: Settings, premixed: bool) -> float:
    if settings.is_unmixedness_stated or not premixed:
        return settings.unmixedness
    return WELL_MIXED


def _equivalence_ratio(operating: Operating, fuel: float, air: float) -> float:
    if air <= 0.0:
        return 0.0
    dry = air / (1.0 + operating.humidity)
    return fuel / dry / operating.stoichiometric_fuel_air_ratio
