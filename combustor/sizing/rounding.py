"""Whole holes and drillable diameters, re-solved, and trimmed until the targets are met."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from combustor.airflow.result import AirSplit
from combustor.airflow.split import split
from combustor.hardware.metal import AxialProfile, Hardware
from combustor.hardware.zone_air import zone_air
from combustor.sizing.drill import drill_step
from combustor.sizing.film_slots import with_metering
from combustor.sizing.metal import metal_of
from combustor.sizing.profile import liner_profile
from combustor.sizing.record import ZoneTarget
from combustor.sizing.sketch import DOME, PREMIXER, SWIRLER, Sketch
from combustor.sizing.state import State, Task

ZONE_TOLERANCE = 0.03
LOSS_TOLERANCE = 1e-3
_GOOD = 0.3
_ROUNDS = 10


@dataclass(frozen=True)
class Rounded:
    """Drilled metal and its air split at the design point.

    ``miss`` is the largest miss over its tolerance: 0.03 in the zones' equivalence ratios,
    0.1 points of pressure loss.
    """

    sketch: Sketch
    hardware: Hardware
    split: AirSplit
    zones: tuple[ZoneTarget, ...]
    miss: float


def round_to_drills(task: Task, state: State) -> Rounded:
    """Return the drilled metal.

    After rounding, single rows are moved by one drill step, many-holed ones by a hundredth of
    their holes, as long as that brings the worst target nearer.

    Parameters
    ----------
    task : Task
    state : State
        Settled, with its fit.
    """
    assert state.fit is not None
    sketch = with_metering(state.sketch, state.fit.areas)
    areas = dict(state.fit.areas)
    assert state.film_plan is not None
    films = state.film_plan.left
    best = _solve(task, sketch, areas, state.fit.split, state.shares, films)
    for _ in range(_ROUNDS):
        if best.miss <= _GOOD:
            break
        tried = [
            (_solve(task, sketch, moved, best.split, state.shares, films), moved)
            for moved in _moves(sketch, areas, best.hardware)
        ]
        nearest, moved = min(tried, key=lambda pair: pair[0].miss)
        if nearest.miss >= best.miss:
            break
        best, areas = nearest, moved
    return best


def _solve(
    task: Task,
    sketch: Sketch,
    areas: Mapping[str, float],
    guess: AirSplit,
    shares: Mapping[str, float],
    films: Mapping[str, AxialProfile],
) -> Rounded:
    hardware = metal_of(sketch, areas, drilled=True)
    solved = guess
    flows = dict(shares)
    # the gas follows the shares of the rounded metal; twice settles it to a few kelvin
    for _ in range(2):
        profile = liner_profile(
            hardware, flows, task.duty.overall, task.duty.table, task.case.model.primary_jet_share
        )
        gas = profile.liner_gas(task.duty.fuel_flow)
        solved = split(hardware, task.duty.inlet, gas, guess=solved)
        total = sum(flow.mass_flow for flow in solved.openings)
        flows = {flow.name: flow.mass_flow / total for flow in solved.openings}
    zones = _zones(task, hardware, flows, films)
    wanted = task.case.targets.pressure_loss
    assert wanted is not None
    miss = max(
        abs(solved.pressure_loss - wanted) / LOSS_TOLERANCE,
        *(abs(zone.reached - zone.wanted) / ZONE_TOLERANCE for zone in zones),
    )
    return Rounded(sketch, hardware, solved, zones, miss)


def _zones(
    task: Task,
    hardware: Hardware,
    flows: Mapping[str, float],
    films: Mapping[str, AxialProfile],
) -> tuple[ZoneTarget, ...]:
    air = zone_air(hardware, flows, task.case.model.primary_jet_share, films)
    wanted = task.case.targets.equivalence_ratio
    primary = ZoneTarget("primary", wanted.primary, task.duty.overall / air["primary"])
    if task.front_end == "lean-premixed":
        return (primary,)
    reached = task.duty.overall / air["secondary"]
    return (primary, ZoneTarget("secondary", wanted.secondary, reached))


def _moves(
    sketch: Sketch, areas: Mapping[str, float], hardware: Hardware
) -> Iterator[dict[str, float]]:
    for row in sketch.rows:
        for name in sketch.names(row.name):
            hole = hardware.opening(name)
            assert hole.diameter is not None
            step = drill_step(hole.diameter, sketch.drill_step)
            for moved in (hole.diameter - step, hole.diameter + step):
                yield {**areas, name: hole.count * 0.25 * math.pi * moved**2}
    front = [SWIRLER] if sketch.premixing is None else [PREMIXER]
    groups = (front, [DOME], [name for ring in sketch.slots for name in sketch.names(ring.name)])
    for group in groups:
        # a hundredth, or one hole of the row with the fewest where that is more
        fewest = min(hardware.opening(name).count for name in group)
        step = 0.01 if group == front else min(max(0.01, 1.0 / fewest), 0.5)
        for scale in (1.0 - step, 1.0 + step):
            yield {**areas, **{name: scale * areas[name] for name in group}}
