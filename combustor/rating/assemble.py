"""The record of a rated point from what split, fire and wall agreed on."""

from __future__ import annotations

import numpy as np

from combustor.emissions.exhaust import Emissions, from_gas
from combustor.emissions.profile import dry_15_along
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.hardware.metal import Hardware
from combustor.hardware.zone_air import zone_air
from combustor.heat.wall import WallMarch
from combustor.rating.balance import balances_of
from combustor.rating.couple import Coupled
from combustor.rating.fire import Fire, layout_of
from combustor.rating.injectors import injectors_of
from combustor.rating.methods import methods_of
from combustor.rating.near_wall import film_shares, quenched_of
from combustor.rating.operating import Operating
from combustor.rating.record import (
    ExitRecord,
    InletRecord,
    PointRating,
    Profile,
    WallPoint,
    ZoneRecord,
)
from combustor.rating.settings import Settings
from combustor.sizing.exit_pattern import pattern_factor_of


def unrated(operating: Operating, hardware: Hardware, fuel: Fuel, coupled: Coupled) -> PointRating:
    """Return a point that does not burn or has no answer: what was stated, no results."""
    converged = coupled.convergence.converged
    return PointRating(
        name=operating.name,
        kind=operating.kind,
        fuel=fuel.name,
        status="blown_out" if converged else "not_converged",
        inlet=inlet_of(operating),
        fuel_flow=operating.fuel_flow,
        fuel_air_ratio=operating.fuel_flow / operating.dry_air_flow,
        equivalence_ratio=operating.equivalence_ratio(operating.fuel_flow),
        convergence=coupled.convergence,
        hardware=hardware,
        cautions=fuel.cautions,
    )


def rated(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    fuel: Fuel,
    coupled: Coupled,
    settings: Settings,
) -> PointRating:
    """Return a burning point with everything that follows from it, findings apart."""
    fire, solved = coupled.fire, coupled.split
    assert fire.exit is not None
    emissions = from_gas(gas, fire.exit.mass_fractions, fire.exit_flow, fire.fuel_flow, fuel)
    return PointRating(
        name=operating.name,
        kind=operating.kind,
        fuel=fuel.name,
        status="burning",
        inlet=inlet_of(operating),
        fuel_flow=fire.fuel_flow,
        fuel_air_ratio=fire.fuel_flow / operating.dry_air_flow,
        equivalence_ratio=operating.equivalence_ratio(fire.fuel_flow),
        pressure_loss=solved.pressure_loss,
        pressure_loss_parts=solved.pressure_loss_parts,
        split=solved,
        zones=zones_of(operating, hardware, coupled, settings),
        profile=profile_of(gas, fire),
        exit=exit_of(operating, hardware, coupled, emissions),
        walls=tuple(point for wall in coupled.walls for point in wall_points(wall)),
        emissions=emissions,
        operability={
            "blowout_fuel_air_ratio": None,
            "blowout_margin_percent": None,
        },
        near_wall=wall_quench_of(gas, hardware, fire, emissions),
        balances=balances_of(gas, operating, coupled),
        methods=methods_of(hardware, operating, fuel, coupled),
        convergence=coupled.convergence,
        hardware=hardware,
        cautions=fuel.cautions,
        injectors=injectors_of(
            operating,
            hardware,
            solved,
            layout_of(hardware, settings).entries,
            fire.fuel_flow,
            settings,
        ),
    )


def wall_quench_of(
    gas: Gas, hardware: Hardware, fire: Fire, emissions: Emissions
) -> dict[str, float | None]:
    """Return how much of the carbon monoxide stems from quenching beside the wall."""
    quench = quenched_of(gas, hardware, fire.chain, fire.beside)
    made = emissions.co_dry_15
    if quench is None:
        return {}
    return {
        "co_beside_wall_percent": 100.0 * quench.share,
        "co_quenched_at_wall_ppmvd_15": None if made is None else 1e6 * quench.quenched * made,
    }


def inlet_of(operating: Operating) -> InletRecord:
    """Return the inlet as reported."""
    inlet = operating.inlet
    return InletRecord(inlet.mass_flow, inlet.pressure, inlet.temperature, operating.humidity)


def zones_of(
    operating: Operating, hardware: Hardware, coupled: Coupled, settings: Settings
) -> tuple[ZoneRecord, ...]:
    """Return the zones of the metal and the exit."""
    fire = coupled.fire
    assert fire.exit is not None
    flows = {flow.name: flow.mass_flow for flow in coupled.split.openings}
    shares = zone_air(hardware, flows, settings.primary_jet_share, film_shares(coupled.walls))
    found = []
    for zone in hardware.zones:
        cells = [s for s in fire.chain.stations if s.name == zone.name]
        if not cells:
            continue
        found.append(
            ZoneRecord(
                name=zone.name,
                equivalence_ratio=operating.equivalence_ratio(fire.fuel_flow, shares[zone.name]),
                temperature=cells[-1].core.temperature,
                residence_time=sum(cell.residence_time for cell in cells),
                air_fraction=shares[zone.name],
            )
        )
    last = [s.residence_time for s in fire.chain.stations if s.name == "transition"]
    found.append(
        ZoneRecord(
            name="exit",
            equivalence_ratio=operating.equivalence_ratio(fire.fuel_flow),
            temperature=fire.exit.temperature,
            residence_time=sum(last),
            air_fraction=1.0,
        )
    )
    return tuple(found)


def profile_of(gas: Gas, fire: Fire) -> Profile:
    """Return temperature, NOx and CO along the chain, mass mean over all streams."""
    dry = dry_15_along(gas, fire.chain.mass_fractions)
    return Profile(fire.chain.x, fire.chain.temperatures, dry.nox, dry.co)


def exit_of(
    operating: Operating, hardware: Hardware, coupled: Coupled, emissions: Emissions
) -> ExitRecord:
    """Return the gas leaving the liner."""
    fire = coupled.fire
    assert fire.exit is not None
    return ExitRecord(
        temperature=fire.exit.temperature,
        pressure=coupled.split.exit_pressure,
        combustion_efficiency=emissions.combustion_efficiency,
        pattern_factor=pattern_factor_of(hardware, operating.inlet, coupled.split),
    )


def wall_points(wall: WallMarch) -> list[WallPoint]:
    """Return the stations of one wall as reported."""
    columns = (
        wall.station,
        wall.temperature,
        wall.film_effectiveness,
        wall.cold_side_temperature,
        wall.radiation_in,
        wall.convection_in,
    )
    rows = np.column_stack(columns)
    return [
        WallPoint(float(x), wall.side, float(t), float(film), float(cold), float(r), float(c))
        for x, t, film, cold, r, c in rows
    ]
