"""One pass of sizing: lengths, films, air budget, rows and areas from the pass before."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, replace

import numpy as np

from combustor.airflow.discharge import METERING_STATIC
from combustor.airflow.result import AirSplit
from combustor.case.schema import Case
from combustor.hardware.metal import Hardware
from combustor.hardware.zone_air import mixed_share
from combustor.sizing import cooling
from combustor.sizing.air_budget import AirBudget, BudgetDemand, budget
from combustor.sizing.casing import Casing
from combustor.sizing.cooling import FilmPlan
from combustor.sizing.diffuser import FAIRED_COEFFICIENT
from combustor.sizing.drill import nearest_drill
from combustor.sizing.duty import Duty
from combustor.sizing.exit_pattern import liner_drop
from combustor.sizing.frame import Frame, LossShares, frame_of
from combustor.sizing.loop import Aim, Fit, first_areas, fit_areas
from combustor.sizing.profile import LinerProfile, liner_profile
from combustor.sizing.reference_area import corrected_loss
from combustor.sizing.rows import RowConditions, RowPlan, plan_row
from combustor.sizing.section import Section
from combustor.sizing.sketch import (
    DOME,
    LEAK,
    SWIRLER,
    Row,
    RowName,
    Sheet,
    Sketch,
    SlotRing,
    VanePack,
    metal_of,
)
from combustor.sizing.swirler import HUB_RATIO, VANE_LOSS_COEFFICIENT

ROW_NAMES: tuple[RowName, ...] = ("primary", "secondary", "dilution")
DOME_DRILL_SHARE = 0.012
_FIRST_FILM = 0.28
_FIRST_HOT = 0.03
_FIRST_HEIGHT = 1.5e-3
_FIRST_SLOTS = 15


@dataclass(frozen=True)
class Task:
    """What stays the same from pass to pass."""

    case: Case
    duty: Duty
    section: Section
    casing: Casing


@dataclass(frozen=True)
class State:
    """What one pass hands to the next.

    ``films`` are slot flows of the whole machine, kg/s; ``shares`` are by opening.
    """

    frame: Frame
    sketch: Sketch
    plans: Mapping[str, RowPlan]
    budget: AirBudget
    films: tuple[float, ...]
    film_plan: FilmPlan | None
    shares: Mapping[str, float]
    profile: LinerProfile | None
    fit: Fit | None
    loss: LossShares


def first_state(task: Task) -> State:
    """Return a state to start from: usual shares and sizes, nothing solved."""
    loss_target = task.case.targets.pressure_loss
    assert loss_target is not None  # required of a case without metal
    loss = _first_loss(task, loss_target)
    shares = _first_budget(task)
    frame = frame_of(
        task.case, task.duty, task.section, task.casing, loss, shares.front, is_firm=False
    )
    hole = 0.08 * frame.liner_height
    plans: dict[str, RowPlan] = {name: RowPlan(8, 8.0, 8.0, hole, 0.0) for name in ROW_NAMES}
    places = [frame.liner_length * place / _FIRST_SLOTS for place in range(_FIRST_SLOTS)]
    sketch = _sketch(task, frame, plans, cooling.slot_rings(places, _FIRST_HEIGHT))
    films = _even(task, sketch, shares.film)
    return State(
        frame,
        sketch,
        plans,
        shares,
        films,
        None,
        shares_by_opening(shares, sketch, films),
        None,
        None,
        loss,
    )


def next_state(task: Task, state: State, frozen: bool) -> State:
    """Return the state after one more pass; ``frozen`` keeps counts and positions.

    Raises
    ------
    InfeasibleError
        Length, air budget or loss cannot be met.
    """
    frame, sketch = state.frame, state.sketch
    if not frozen:
        frame = frame_of(
            task.case,
            task.duty,
            task.section,
            task.casing,
            state.loss,
            state.budget.front,
            is_firm=state.fit is not None,
        )
        sketch = _sketch(task, frame, state.plans, state.sketch.slots)
    shares = shares_by_opening(state.budget, sketch, state.films)
    flux = _metering_flux(task, state)
    sketch, plan = _cool(task, sketch, state.plans, shares, flux, state.films if frozen else None)
    films = _held_to_stated(task, plan.flow)
    share_out = _budget(task, sketch, films)
    shares = shares_by_opening(share_out, sketch, films)
    profile = _profile(task, sketch, shares)
    plans = _rows(task, state, sketch, shares, profile, frozen)
    if not frozen:
        sketch = replace(sketch, rows=_placed(frame, plans))
        profile = _profile(task, sketch, shares)
    fit = _fit(task, state, sketch, shares, profile)
    parts, drop = fit.split.pressure_loss_parts, liner_drop(fit.split)
    return State(
        frame,
        sketch,
        plans,
        share_out,
        films,
        plan,
        shares,
        profile,
        fit,
        LossShares(parts["diffuser"], parts["hot"], drop / task.duty.inlet.pressure),
    )


def shares_by_opening(
    shares: AirBudget, sketch: Sketch, films: tuple[float, ...]
) -> dict[str, float]:
    """Return the share of all air of every opening; slots take the film air as ``films``."""
    by_name = {
        SWIRLER: shares.swirler,
        DOME: shares.dome,
        "primary": shares.primary,
        "secondary": shares.secondary,
        "dilution": shares.dilution,
        LEAK: shares.leak,
    }
    total = sum(films)
    for ring, flow in zip(sketch.slots, films, strict=True):
        by_name[ring.name] = shares.film * flow / total
    return by_name


def bare_metal(sketch: Sketch) -> Hardware:
    """Return the metal with openings of token size, for what depends on positions only."""
    names = [SWIRLER, DOME, LEAK, *(row.name for row in sketch.rows)]
    names += [ring.name for ring in sketch.slots]
    return metal_of(sketch, dict.fromkeys(names, 1e-4), drilled=False)


def _first_loss(task: Task, loss: float) -> LossShares:
    inlet_annulus = task.case.combustor.inlet_annulus
    assert inlet_annulus is not None
    inlet = task.duty.inlet
    head = corrected_loss(
        inlet.mass_flow,
        inlet.temperature,
        inlet.pressure,
        inlet_annulus.area,
        inlet.gas_constant,
    )
    diffuser = min(FAIRED_COEFFICIENT * head, 0.5 * loss)
    hot = _FIRST_HOT * loss
    return LossShares(diffuser, hot, loss - diffuser)


def _first_budget(task: Task) -> AirBudget:
    targets = task.case.targets
    film = _FIRST_FILM if targets.film_air is None else targets.film_air
    primary_air = min(task.duty.overall / targets.equivalence_ratio.primary, 0.5)
    front = min(0.16, 0.8 * primary_air)
    row = (primary_air - front) / task.case.model.primary_jet_share
    row = min(row, 0.9 - front - film)
    rest = 1.0 - front - row - film - targets.leakage
    return AirBudget(0.6 * front, 0.4 * front, row, 0.2 * rest, 0.8 * rest, film, targets.leakage)


def _even(task: Task, sketch: Sketch, film_share: float) -> tuple[float, ...]:
    count = len(sketch.slots)
    return (film_share * task.duty.inlet.mass_flow / count,) * count


def _sketch(
    task: Task, frame: Frame, plans: Mapping[str, RowPlan], slots: tuple[SlotRing, ...]
) -> Sketch:
    targets, combustor = task.case.targets, task.case.combustor
    assert combustor.inlet_annulus is not None and combustor.exit_annulus is not None
    return Sketch(
        section=task.section,
        flow=combustor.flow,
        casing_height=task.casing.height,
        liner_height=frame.liner_height,
        zone_ends=frame.zone_ends,
        transition_length=combustor.transition_length,
        exit_area=combustor.exit_annulus.area / task.section.cans,
        diffuser=frame.diffuser,
        inlet_area=combustor.inlet_annulus.area,
        vane_pack=VanePack(
            targets.swirler_vane_angle,
            targets.swirler_vane_count,
            targets.swirler_vane_thickness,
            VANE_LOSS_COEFFICIENT[targets.swirler_vane_shape],
            HUB_RATIO,
            targets.swirler_hub_diameter,
        ),
        dome_hole_diameter=nearest_drill(DOME_DRILL_SHARE * frame.liner_height),
        rows=_placed(frame, plans),
        slots=slots,
        hole_edge=targets.hole_edge,
        sheet=Sheet(
            targets.sheet_thickness,
            targets.sheet_conductivity,
            targets.sheet_emissivity,
            targets.casing_emissivity,
            targets.coating_thickness,
            targets.coating_conductivity,
            targets.roughness,
        ),
        drill_step=targets.drill_step,
    )


def _placed(frame: Frame, plans: Mapping[str, RowPlan]) -> tuple[Row, ...]:
    primary_end, secondary_end, _ = frame.zone_ends
    radius = {name: 0.5 * plan.hole_diameter for name, plan in plans.items()}
    third = primary_end + (secondary_end - primary_end) / 3.0
    clear = primary_end + radius["secondary"] + 2.0 * cooling.BAND_MARGIN
    places: dict[RowName, float] = {
        "primary": math.floor(1e3 * (primary_end - radius["primary"])) / 1e3,
        "secondary": math.ceil(1e3 * max(third, clear)) / 1e3,
        "dilution": math.ceil(1e3 * (secondary_end + radius["dilution"])) / 1e3,
    }
    return tuple(Row(name, places[name], plans[name].count) for name in ROW_NAMES)


def _band(row: Row, plan: RowPlan) -> tuple[float, float]:
    half = 0.5 * plan.hole_diameter + cooling.BAND_MARGIN
    return row.station - half, row.station + half


def _profile(task: Task, sketch: Sketch, shares: Mapping[str, float]) -> LinerProfile:
    return liner_profile(
        bare_metal(sketch),
        shares,
        task.duty.overall,
        task.duty.table,
        task.case.model.primary_jet_share,
    )


def _cool(
    task: Task,
    sketch: Sketch,
    plans: Mapping[str, RowPlan],
    shares: Mapping[str, float],
    flux: float,
    start: tuple[float, ...] | None,
) -> tuple[Sketch, FilmPlan]:
    """Return the sketch with its slots and their air; with a start the slots stay."""
    duty, targets = task.duty, task.case.targets
    wall, inlet = bare_metal(sketch).walls[0], duty.inlet
    profile = _profile(task, sketch, shares)
    gas = cooling.gas_side(
        sketch, profile, inlet, duty.fuel_flow, inlet.pressure, duty.stoichiometric
    )
    air = cooling.annulus_side(sketch, profile, inlet, shares[SWIRLER] + shares[DOME])
    wanted = targets.wall_temperature
    if start is not None:
        return sketch, cooling.plan_films(sketch, wall, gas, air, inlet, wanted, flux, start)
    room = cooling.slot_room(sketch.liner_height, targets.slot_pitch, targets.slot_height)
    bands = [_band(row, plans[row.name]) for row in sketch.rows]
    return cooling.lay_slots(sketch, bands, room, wall, gas, air, inlet, wanted, flux)


def _metering_flux(task: Task, state: State) -> float:
    """Return the most air that metering holes pass by area, whatever the slot [kg/(s m2)]."""
    if state.fit is None:
        drop = state.loss.jets * task.duty.inlet.pressure
        return METERING_STATIC * math.sqrt(2.0 * task.duty.density * drop)
    solved, areas = state.fit.split, state.fit.areas
    films = [flow for flow in solved.openings if flow.role == "film"]
    return max(flow.mass_flow / (areas[flow.name] * task.section.cans) for flow in films)


def _held_to_stated(task: Task, flow: tuple[float, ...]) -> tuple[float, ...]:
    stated = task.case.targets.film_air
    if stated is None:
        return flow
    scale = stated * task.duty.inlet.mass_flow / sum(flow)
    return tuple(scale * one for one in flow)


def _budget(task: Task, sketch: Sketch, films: tuple[float, ...]) -> AirBudget:
    targets, metal = task.case.targets, bare_metal(sketch)
    air = task.duty.inlet.mass_flow
    end = sketch.zone_ends[1]
    mixed = sum(
        flow * mixed_share(metal, metal.opening(ring.name), end)
        for ring, flow in zip(sketch.slots, films, strict=True)
    )
    return budget(
        BudgetDemand(
            overall=task.duty.overall,
            primary=targets.equivalence_ratio.primary,
            secondary=targets.equivalence_ratio.secondary,
            primary_jet_share=task.case.model.primary_jet_share,
            film=sum(films) / air,
            film_mixed=mixed / air,
            leak=targets.leakage,
            swirler=targets.swirler_air,
            dome=targets.dome_air,
        )
    )


def _rows(
    task: Task,
    state: State,
    sketch: Sketch,
    shares: Mapping[str, float],
    profile: LinerProfile,
    frozen: bool,
) -> dict[str, RowPlan]:
    targets = task.case.targets
    stated = {
        "primary": targets.primary_holes,
        "secondary": targets.secondary_holes,
        "dilution": targets.dilution_holes,
    }
    plans: dict[str, RowPlan] = {}
    for row in sketch.rows:
        conditions = row_conditions(task, sketch, row, shares[row.name], profile, _solved(state))
        count = row.count if frozen else stated[row.name]
        plan = plan_row(conditions, task.section, sketch.liner_height, count)
        if frozen:
            plan = replace(plan, bound=state.plans[row.name].bound)
        plans[row.name] = plan
    return plans


def row_conditions(
    task: Task,
    sketch: Sketch,
    row: Row,
    share: float,
    profile: LinerProfile,
    solved: AirSplit | None,
) -> RowConditions:
    """Return what a row meets: core gas just upstream, jets by the latest split."""
    inlet, cans = task.duty.inlet, task.section.cans
    upstream = int(np.searchsorted(profile.station, row.station - 1e-9)) - 1
    gas_flow = (float(profile.entered[upstream]) * inlet.mass_flow + task.duty.fuel_flow) / cans
    core = profile.core
    gas_density = inlet.pressure / (
        float(core.gas_constant[upstream]) * float(core.temperature[upstream])
    )
    gas_velocity = gas_flow / (gas_density * sketch.liner_area)
    density = task.duty.density
    if solved is None:
        drop = 0.8 * (task.case.targets.pressure_loss or 0.0) * inlet.pressure
        velocity, coefficient = math.sqrt(2.0 * drop / density), 0.55
    else:
        jet = solved.opening(row.name)
        velocity, density = jet.jet_velocity, jet.jet_density
        coefficient = max(jet.discharge_coefficient, 0.05)
    return RowConditions(
        jet_flow=share * inlet.mass_flow / cans,
        gas_flow=gas_flow,
        jet_velocity=velocity,
        jet_density=density,
        discharge_coefficient=coefficient,
        momentum_ratio=density * velocity**2 / (gas_density * gas_velocity**2),
    )


def _solved(state: State) -> AirSplit | None:
    return None if state.fit is None else state.fit.split


def _fit(
    task: Task,
    state: State,
    sketch: Sketch,
    shares: Mapping[str, float],
    profile: LinerProfile,
) -> Fit:
    loss = task.case.targets.pressure_loss
    assert loss is not None
    aim = Aim(shares, loss)
    start = first_areas(sketch, aim, task.duty.inlet)
    guess = None
    if state.fit is not None and state.fit.areas.keys() == start.keys():
        start = {
            name: area * shares[name] / state.shares[name] for name, area in state.fit.areas.items()
        }
        guess = state.fit.split
    gas = profile.liner_gas(task.duty.fuel_flow)
    return fit_areas(sketch, aim, task.duty.inlet, gas, start, guess)
