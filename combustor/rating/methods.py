"""Which methods a rated point stands on."""

from __future__ import annotations

from combustor.airflow.methods import methods_used
from combustor.base.method import Method
from combustor.emissions.bases import REFERENCE_OXYGEN_CORRECTION
from combustor.emissions.unburnt import COMBUSTION_EFFICIENCY
from combustor.fuel.choose_mechanism import method_of
from combustor.fuel.composition import STOICHIOMETRY
from combustor.fuel.gas import DRY_AIR_COMPOSITION
from combustor.fuel.heating_value import ISO_HEATING_VALUES, MECHANISM_HEATING_VALUES
from combustor.fuel.lumped_methods import lumped_methods
from combustor.fuel.record import Fuel
from combustor.hardware.beam_length import BEAM_LENGTH
from combustor.hardware.metal import Hardware
from combustor.hardware.zone_air import FILM_MIXING, FILM_ROLES, PRIMARY_JET_SHARE
from combustor.kinetics.chain import EXCHANGE_WITH_THE_MEAN
from combustor.kinetics.near_wall import NEAR_WALL
from combustor.kinetics.primary import RECIRCULATION_TO_STREAMS
from combustor.kinetics.unmixedness import STREAMS_BY_SQUARE_ROOT, UNMIXED_STREAMS
from combustor.rating import settings as set_by
from combustor.rating.couple import Coupled
from combustor.rating.injectors import INJECTOR_AIR, PREMIXED_UNMIXEDNESS, is_premixed
from combustor.rating.operating import LIQUID_WATER, Operating
from combustor.sizing.fire import FUEL_DEMAND
from combustor.sizing.zones import PATTERN_FACTOR


def methods_of(
    hardware: Hardware, operating: Operating, fuel: Fuel, coupled: Coupled
) -> tuple[Method, ...]:
    """Return every method a rating stands on, once each, in the order of the work."""
    used = [
        DRY_AIR_COMPOSITION,
        STOICHIOMETRY,
        ISO_HEATING_VALUES,
        MECHANISM_HEATING_VALUES,
        method_of(fuel.mechanism),
    ]
    used += lumped_methods(fuel)
    if coupled.evaporation is not None:
        used += coupled.evaporation.methods
    if operating.exit_temperature is not None:
        used.append(FUEL_DEMAND)
    if operating.water_flow > 0.0:
        used.append(LIQUID_WATER)
    used += methods_used(hardware)
    used += [
        PRIMARY_JET_SHARE,
        UNMIXED_STREAMS,
        STREAMS_BY_SQUARE_ROOT,
        set_by.UNMIXEDNESS,
        set_by.RECIRCULATION,
        RECIRCULATION_TO_STREAMS,
        set_by.JET_MIXING_LENGTH,
        set_by.MIXING,
        EXCHANGE_WITH_THE_MEAN,
    ]
    used += _of_injectors(hardware)
    if any(opening.role in FILM_ROLES for opening in hardware.openings):
        used += [FILM_MIXING, NEAR_WALL]
    used.append(BEAM_LENGTH)
    used += [method for wall in coupled.walls for method in wall.methods]
    used += [REFERENCE_OXYGEN_CORRECTION, COMBUSTION_EFFICIENCY, PATTERN_FACTOR]
    return tuple({method.key: method for method in used}.values())


def _of_injectors(hardware: Hardware) -> list[Method]:
    used = []
    if any(is_premixed(injector, hardware) for injector in hardware.injectors):
        used.append(PREMIXED_UNMIXEDNESS)
    if len(hardware.injectors) > 1:
        used.append(INJECTOR_AIR)
    return used
