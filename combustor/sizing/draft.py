"""The first state, and a sketch from lengths and row plans."""

from __future__ import annotations

import math
from collections.abc import Mapping

from combustor.sizing import film_slots
from combustor.sizing.air_budget import LEAST_DILUTION, AirBudget
from combustor.sizing.diffuser import FAIRED_COEFFICIENT
from combustor.sizing.drill import nearest_drill
from combustor.sizing.frame import Frame, LossShares, frame_of
from combustor.sizing.front_ends import DIFFUSION_ROWS, PREMIXER_VELOCITY_SHARE, row_names
from combustor.sizing.reference_area import corrected_loss
from combustor.sizing.rows import RowPlan
from combustor.sizing.section import Section
from combustor.sizing.sketch import (
    Premixing,
    Row,
    Sheet,
    Sketch,
    SlotRing,
    VanePack,
)
from combustor.sizing.state import State, Task, shares_by_opening
from combustor.sizing.swirler import HUB_RATIO, SWIRLER_PITCH, VANE_LOSS_COEFFICIENT

DOME_DRILL_SHARE = 0.012
SMALLEST_DOME_DRILL = 1.5e-3
_FIRST_FILM = 0.28
_FIRST_HOT = 0.03
_FIRST_HEIGHT = 1.5e-3
_FIRST_SLOTS = 15


def first_state(task: Task) -> State:
    """Return a state to start from: usual shares and sizes, nothing solved."""
    loss_target = task.case.targets.pressure_loss
    assert loss_target is not None  # required of a case without metal
    loss = _first_loss(task, loss_target)
    shares = _first_budget(task)
    frame = frame_of(
        task.case,
        task.duty,
        task.section,
        task.casing,
        loss,
        shares.front,
        is_firm=False,
        burnout=task.burnout,
    )
    plans = plans_for(task, frame, shares, {})
    places = [frame.liner_length * place / _FIRST_SLOTS for place in range(_FIRST_SLOTS)]
    sketch = draw_sketch(task, frame, plans, film_slots.slot_rings(places, _FIRST_HEIGHT))
    films = even_films(task, sketch, shares.film)
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


def plans_for(
    task: Task, frame: Frame, shares: AirBudget, plans: Mapping[str, RowPlan]
) -> dict[str, RowPlan]:
    """Return the plans of the rows there are to be; a new one starts from usual holes."""
    usual = RowPlan(8, 8.0, 8.0, 0.08 * frame.liner_height, 0.0)
    names = row_names(task.front_end, shares.spare >= LEAST_DILUTION)
    return {name: plans.get(name, usual) for name in names}


def draw_sketch(
    task: Task, frame: Frame, plans: Mapping[str, RowPlan], slots: tuple[SlotRing, ...]
) -> Sketch:
    """Return the sketch of a frame with its rows placed and the given slots."""
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
        dome_hole_diameter=nearest_drill(
            max(DOME_DRILL_SHARE * frame.liner_height, SMALLEST_DOME_DRILL)
        ),
        rows=placed(frame, plans),
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
        swirlers=swirlers_of(task.section, frame.liner_height, targets.swirlers),
        premixing=_premixing(task),
        outer_dilution=targets.outer_dilution,
    )


def _premixing(task: Task) -> Premixing | None:
    targets = task.case.targets
    if task.front_end != "lean-premixed":
        return None
    vanes = VanePack(
        targets.swirler_vane_angle,
        targets.swirler_vane_count,
        targets.swirler_vane_thickness,
        VANE_LOSS_COEFFICIENT[targets.swirler_vane_shape],
        HUB_RATIO,
    )
    # vanes leave about six tenths of the ideal velocity through the passage
    drop = 0.8 * (targets.pressure_loss or 0.0) * task.duty.inlet.pressure
    velocity = PREMIXER_VELOCITY_SHARE * math.sqrt(2.0 * drop / task.duty.density)
    length = round(velocity * targets.premixer_time, 3)
    return Premixing(vanes, targets.pilot_fuel, length)


def swirlers_of(section: Section, liner_height: float, stated: int | None) -> int:
    """Return the number of swirlers in one liner: one a can, an even number round a ring."""
    if stated is not None:
        return stated
    if section.mean_diameter is None or section.is_round:
        return 1
    pitches = math.pi * section.mean_diameter / (SWIRLER_PITCH * liner_height)
    return max(2 * round(pitches / 2.0), 2)


def placed(frame: Frame, plans: Mapping[str, RowPlan]) -> tuple[Row, ...]:
    """Return the rows where they stand, to whole millimetres; see `rows.ROW_POSITION`."""
    primary_end, secondary_end, liner_end = frame.zone_ends
    third = primary_end + (secondary_end - primary_end) / 3.0
    margin = 2.0 * film_slots.BAND_MARGIN
    found = []
    for name in DIFFUSION_ROWS:
        if name not in plans:
            continue
        radius = 0.5 * plans[name].hole_diameter
        if name == "primary":
            place = max(math.floor(1e3 * (primary_end - radius)) / 1e3, 0.5 * primary_end)
        elif name == "dilution":
            place = min(math.ceil(1e3 * (secondary_end + radius)) / 1e3, liner_end - 1e-3)
        else:
            # a quench row opens its zone; behind a primary row there is no room to
            start = third if "primary" in plans else 0.0
            place = math.ceil(1e3 * max(start, primary_end + radius + margin)) / 1e3
            # in a small liner the margins would carry the row beyond its zone
            place = min(place, round(0.5 * (primary_end + secondary_end), 4))
        found.append(Row(name, place, plans[name].count))
    return tuple(found)


def band(row: Row, plan: RowPlan) -> tuple[float, float]:
    """Return the stretch a row takes from the slots: its holes and a margin [m]."""
    half = 0.5 * plan.hole_diameter + film_slots.BAND_MARGIN
    return row.station - half, row.station + half


def even_films(task: Task, sketch: Sketch, film_share: float) -> tuple[float, ...]:
    """Return a share of all air spread evenly over the slots [kg/s]."""
    count = len(sketch.slots)
    return (film_share * task.duty.inlet.mass_flow / count,) * count


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
    if task.front_end != "diffusion":
        return _first_other(task, film)
    rest = 1.0 - front - row - film - targets.leakage
    return AirBudget(0.6 * front, 0.4 * front, row, 0.2 * rest, 0.8 * rest, film, targets.leakage)


def _first_other(task: Task, film: float) -> AirBudget:
    """Return usual shares of a front end without a primary row."""
    targets = task.case.targets
    front = min(task.duty.overall / targets.equivalence_ratio.primary, 0.85)
    film = min(film, 0.5 * (1.0 - front - targets.leakage))
    rest = 1.0 - front - film - targets.leakage
    if task.front_end == "rich-lean":
        return AirBudget(
            0.7 * front, 0.3 * front, 0.0, 0.6 * rest, 0.4 * rest, film, targets.leakage
        )
    has_row = rest >= LEAST_DILUTION
    return AirBudget(
        swirler=0.08 * front,
        dome=0.08 * front,
        primary=0.0,
        secondary=0.0,
        dilution=rest if has_row else 0.0,
        film=film if has_row else film + rest,
        leak=targets.leakage,
        premixer=0.84 * front,
        spare=rest,
    )
