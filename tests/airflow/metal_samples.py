"""Plausible machines to test with: an industrial can and a small annular liner."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

import numpy as np

from combustor.airflow.split import Inlet, LinerGas
from combustor.hardware.metal import (
    AxialProfile,
    Diffuser,
    Edge,
    Feed,
    Hardware,
    LinerWall,
    Opening,
    Passage,
    Role,
    Side,
    Slot,
    Swirler,
    Zone,
)


def disc(diameter: float) -> float:
    return math.pi / 4 * diameter**2


def row(
    name: str,
    role: Role,
    station: float,
    count: int,
    diameter: float,
    side: Side = "outer",
    edge: Edge = "plain",
    feed: Feed = "total",
    slot: Slot | None = None,
) -> Opening:
    return Opening(
        name=name,
        role=role,
        side=side,
        station=station,
        count=count,
        area=disc(diameter),
        edge=edge,
        feed=feed,
        diameter=diameter,
        slot=slot,
    )


def swirler(name: str, count: int, tip: float, hub: float, vane_angle: float = 45.0) -> Opening:
    area = disc(tip) - disc(hub) - 0.5 * 12 * 0.0015 * (tip - hub)
    pack = Swirler(hub, tip, math.radians(vane_angle), 12, 0.0015, 1.3)
    return Opening(
        name=name,
        role="swirler",
        side="dome",
        station=0.0,
        count=count,
        area=area,
        edge="swirler",
        feed="total",
        swirler=pack,
    )


def can_inlet(share: float = 1.0) -> Inlet:
    """Full load of an industrial machine of about 3 MW; ``share`` scales the flow."""
    return Inlet(14.2 * share, 9.9e5, 598.15, 288.2, 1.375)


def can(
    flow: str = "straight", cans: int = 1, openings: Sequence[Opening] | None = None
) -> Hardware:
    casing, liner, length = 0.40, 0.325, 0.90
    liner_area, annulus_area = disc(liner), disc(casing) - disc(liner + 0.004)
    gap = 0.5 * (casing - liner - 0.004)
    length_of_slot = math.pi * liner

    def film(name: str, station: float) -> Opening:
        return row(
            name, "film", station, 100, 0.0031, edge="metering", feed="static",
            slot=Slot(0.003, 0.0012, length_of_slot),
        )  # fmt: skip

    default = (
        swirler("swirler", 1, 0.125, 0.060),
        row("heat shield", "dome", 0.0, 120, 0.0030, side="dome", edge="orifice"),
        film("slot 1", 0.04),
        row("primaries", "primary", 0.16, 8, 0.0280),
        film("slot 2", 0.24),
        row("secondaries", "secondary", 0.34, 8, 0.0250, edge="plunged"),
        film("slot 3", 0.44),
        row("dilution", "dilution", 0.56, 8, 0.0490),
        film("slot 4", 0.68),
        row("seals", "leak", 0.90, 1, 0.019, edge="orifice", feed="static"),
    )
    rows = default if openings is None else tuple(openings)
    return Hardware(
        layout="can",
        cans=cans,
        flow="reverse" if flow == "reverse" else "straight",
        reference_area=disc(casing) * cans,
        reference_height=casing,
        liner_height=liner,
        liner=Passage("liner", AxialProfile.constant(liner_area), AxialProfile.constant(liner)),
        liner_length=length,
        transition_length=0.25,
        exit_area=disc(0.52) - disc(0.43),
        annuli=(
            Passage("outer", AxialProfile.constant(annulus_area), AxialProfile.constant(2 * gap)),
        ),
        walls=(
            LinerWall(
                "outer", AxialProfile.constant(math.pi * liner), 0.9 * liner, 0.002, 25.0, 0.8, 0.8,
                liner / casing,
            ),
        ),
        diffuser=Diffuser("dump", 0.0280 * cans, 0.045 * cans, 0.12, 0.42),
        openings=rows,
        zones=(
            Zone("primary", 0.0, 0.25),
            Zone("secondary", 0.25, 0.45),
            Zone("dilution", 0.45, length),
        ),
    )  # fmt: skip


def can_annular() -> Hardware:
    """Three cans in one ring: the air passes between them, no longer in a gap of one width."""
    three = can(cans=3)
    area, hydraulic = 1.35 * three.annuli[0].area.value[0], 0.055
    tubes = row("cross-fire", "leak", 0.12, 2, 0.008, edge="orifice", feed="static")
    metal = replace(
        three,
        layout="can-annular",
        annuli=(Passage("outer", AxialProfile.constant(area), AxialProfile.constant(hydraulic)),),
    )
    return with_opening(metal, tubes)


def annular_inlet(share: float = 1.0) -> Inlet:
    """An aero-type annular machine: 20 kg/s, 16 bar, 750 K."""
    return Inlet(20.0 * share, 1.6e6, 750.0, 287.05, 1.38)


def annular(flow: str = "straight", openings: Sequence[Opening] | None = None) -> Hardware:
    mean, liner_height, length = 0.50, 0.062, 0.20
    circle = math.pi * mean
    # The liner narrows towards the exit and the annuli with it are not quite alike.
    liner_area = AxialProfile((0.0, 0.12, 0.20), (circle * 0.062, circle * 0.062, circle * 0.048))
    outer = AxialProfile((0.0, 0.20), (circle * 0.0160, circle * 0.0150))
    inner = AxialProfile((0.0, 0.20), (circle * 0.0125, circle * 0.0120))

    def film(name: str, station: float, side: Side) -> Opening:
        return row(
            name, "film", station, 240, 0.0022, side=side, edge="metering", feed="static",
            slot=Slot(0.002, 0.0008, circle),
        )  # fmt: skip

    default = (
        swirler("swirlers", 18, 0.040, 0.020),
        row("heat shield", "dome", 0.0, 700, 0.0017, side="dome", edge="orifice"),
        film("outer slot 1", 0.02, "outer"),
        film("inner slot 1", 0.02, "inner"),
        row("outer primaries", "primary", 0.055, 36, 0.0110, edge="plunged"),
        row("inner primaries", "primary", 0.055, 36, 0.0100, side="inner", edge="plunged"),
        film("outer slot 2", 0.09, "outer"),
        film("inner slot 2", 0.09, "inner"),
        row("outer dilution", "dilution", 0.12, 36, 0.0160),
        row("inner dilution", "dilution", 0.12, 36, 0.0150, side="inner"),
        row("outer seal", "leak", 0.20, 1, 0.017, edge="orifice", feed="static"),
    )
    rows = default if openings is None else tuple(openings)
    return Hardware(
        layout="annular",
        cans=1,
        flow="reverse" if flow == "reverse" else "straight",
        reference_area=circle * 0.095,
        reference_height=0.095,
        liner_height=liner_height,
        liner=Passage("liner", liner_area, AxialProfile.constant(2 * liner_height)),
        liner_length=length,
        transition_length=0.0,
        exit_area=circle * 0.048,
        annuli=(
            Passage("outer", outer, AxialProfile.constant(0.031)),
            Passage("inner", inner, AxialProfile.constant(0.0245)),
        ),
        walls=(
            LinerWall(
                "outer", AxialProfile.constant(circle * 1.12), 0.09, 0.0015, 25.0, 0.8, 0.8, 0.9,
            ),
            LinerWall(
                "inner", AxialProfile.constant(circle * 0.88), 0.09, 0.0015, 25.0, 0.8, 0.8, 1.1,
            ),
        ),
        diffuser=Diffuser("dump", 0.0210, 0.034, 0.06, 0.35),
        openings=rows,
        zones=(
            Zone("primary", 0.0, 0.07),
            Zone("secondary", 0.07, 0.11),
            Zone("dilution", 0.11, length),
        ),
    )  # fmt: skip


def fire(hardware: Hardware, fuel_flow: float) -> LinerGas:
    """A made-up but plausible mean temperature along the liner."""
    x = np.linspace(0.0, hardware.liner_length, 25)
    s = x / hardware.liner_length
    temperature = 2150.0 - 880.0 * np.clip((s - 0.12) / 0.75, 0.0, 1.0)
    return LinerGas(
        station=x,
        temperature=temperature,
        gas_constant=np.full(x.size, 289.5),
        heat_capacity_ratio=1.27 + 0.03 * s,
        fuel_flow=fuel_flow,
        fuel_station=0.0,
    )


def with_opening(hardware: Hardware, opening: Opening) -> Hardware:
    """Replace the opening of the same name, or add it."""
    names = [o.name for o in hardware.openings]
    if opening.name in names:
        rows = [opening if o.name == opening.name else o for o in hardware.openings]
    else:
        rows = [*hardware.openings, opening]
    return replace(hardware, openings=tuple(sorted(rows, key=lambda o: o.station)))
