"""One pass of sizing: lengths, films, air budget, rows and areas from the pass before."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import replace

import numpy as np

from combustor.airflow.discharge import METERING_STATIC
from combustor.airflow.result import AirSplit
from combustor.hardware.metal import AxialProfile, Hardware
from combustor.hardware.zone_air import mixed_share
from combustor.sizing import cooling, film_slots
from combustor.sizing.air_budget import AirBudget, BudgetDemand, budget
from combustor.sizing.cooling import FilmPlan
from combustor.sizing.draft import band, draw_sketch, placed, plans_for
from combustor.sizing.exit_pattern import liner_drop
from combustor.sizing.frame import LossShares, frame_of
from combustor.sizing.front_ends import lean_budget, rich_budget
from combustor.sizing.held_back import with_less_film
from combustor.sizing.loop import Aim, Fit, first_areas, fit_areas
from combustor.sizing.profile import LinerProfile
from combustor.sizing.rows import RowConditions, RowPlan, plan_row
from combustor.sizing.sketch import (
    Row,
    Sketch,
)
from combustor.sizing.state import State, Task, bare_metal, profile_of, shares_by_opening
from combustor.sizing.wall_view import views_of


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
            burnout=task.burnout,
            drawn=None if state.fit is None else frame.liner_height,
        )
        plans = plans_for(task, frame, state.budget, state.plans)
        sketch = draw_sketch(task, frame, plans, state.sketch.slots)
        state = replace(state, plans=plans)
    shares = shares_by_opening(state.budget, sketch, state.films)
    flux = _metering_flux(task, state)
    sketch, plan = _cool(task, state, sketch, shares, flux, state.films if frozen else None)
    films = _held_to_stated(task, plan.flow)
    share_out = _budget(task, sketch, films, plan.left)
    shares = shares_by_opening(share_out, sketch, films)
    profile = profile_of(task, sketch, shares)
    plans = _rows(task, state, sketch, shares, profile, frozen)
    if not frozen:
        sketch = replace(sketch, rows=placed(frame, plans))
        profile = profile_of(task, sketch, shares)
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


def _cool(
    task: Task,
    state: State,
    sketch: Sketch,
    shares: Mapping[str, float],
    flux: float,
    start: tuple[float, ...] | None,
) -> tuple[Sketch, FilmPlan]:
    """Return the sketch with its slots and their air; with a start the slots stay."""
    targets = task.case.targets
    wall = wall_of(task, bare_metal(sketch), shares, flux, _films_left(state))
    if start is not None:
        return sketch, cooling.plan_films(sketch, wall, start)
    room = film_slots.slot_room(sketch.liner_height, targets.slot_pitch, targets.slot_height)
    bands = [band(row, state.plans[row.name]) for row in sketch.rows]
    return cooling.lay_slots(sketch, bands, room, wall)


def wall_of(
    task: Task,
    metal: Hardware,
    shares: Mapping[str, float],
    metering_flux: float,
    films: Mapping[str, AxialProfile] | None,
) -> cooling.Wall:
    """Return the walls that films have to hold, for given shares of the air by opening."""
    views = views_of(
        metal,
        task.walls,
        shares,
        task.case.model.primary_jet_share,
        task.radiation,
        films,
    )
    limit = task.case.targets.wall_temperature - cooling.WALL_MARGIN
    return cooling.Wall(views, limit, metering_flux, task.duty.inlet.mass_flow)


def _films_left(state: State) -> Mapping[str, AxialProfile] | None:
    return None if state.film_plan is None else state.film_plan.left


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


def _budget(
    task: Task, sketch: Sketch, films: tuple[float, ...], left: Mapping[str, AxialProfile]
) -> AirBudget:
    targets, metal = task.case.targets, bare_metal(sketch)
    air = task.duty.inlet.mass_flow
    end = sketch.zone_ends[1]
    mixed = sum(
        flow * mixed_share(metal, metal.opening(sketch.names(ring.name)[0]), end, films=left)
        for ring, flow in zip(sketch.slots, films, strict=True)
    )
    demand = BudgetDemand(
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
    if targets.film_air is not None:
        return _budget_for(task, sketch, demand)
    return with_less_film(demand, lambda asked: _budget_for(task, sketch, asked))


def _budget_for(task: Task, sketch: Sketch, demand: BudgetDemand) -> AirBudget:
    if task.front_end == "rich-lean":
        return rich_budget(demand)
    if task.front_end == "lean-premixed":
        return lean_budget(demand, task.case.targets.pilot_fuel, bool(sketch.rows))
    return budget(demand)


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
        share = sum(shares[name] for name in sketch.names(row.name))
        conditions = row_conditions(task, sketch, row, share, profile, _solved(state, sketch, row))
        count = row.count if frozen else _of_all_sides(stated[row.name], sketch)
        plan = plan_row(conditions, task.section, sketch.liner_height, count)
        if frozen:
            plan = replace(plan, bound=state.plans[row.name].bound)
        plans[row.name] = plan
    return plans


def _of_all_sides(count: int | None, sketch: Sketch) -> int | None:
    return None if count is None else count * len(sketch.sides)


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
        angle = 0.4 * math.pi
    else:
        jet = solved.opening(sketch.names(row.name)[0])
        velocity, density = jet.jet_velocity, jet.jet_density
        coefficient, angle = max(jet.discharge_coefficient, 0.05), jet.jet_angle
    return RowConditions(
        jet_flow=share * inlet.mass_flow / cans,
        gas_flow=gas_flow,
        jet_velocity=velocity,
        jet_density=density,
        discharge_coefficient=coefficient,
        momentum_ratio=density * velocity**2 / (gas_density * gas_velocity**2),
        jet_angle=angle,
    )


def _solved(state: State, sketch: Sketch, row: Row) -> AirSplit | None:
    """Return the latest split, None where it does not know the row yet."""
    if state.fit is None or sketch.names(row.name)[0] not in state.fit.areas:
        return None
    return state.fit.split


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
