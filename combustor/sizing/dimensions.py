"""How each dimension came about: value, method, and the candidate that lost."""

from __future__ import annotations

import math
from collections.abc import Iterator

from combustor.airflow.jets import PENETRATION_ROW
from combustor.hardware.metal import Opening
from combustor.hardware.zone_air import PRIMARY_JET_SHARE
from combustor.sizing import (
    cooling,
    diffuser,
    film_slots,
    front_ends,
    liner_ratio,
    rows,
    swirler,
    zones,
)
from combustor.sizing.air_budget import AIR_BUDGET, DOME_SHARES, PREFERRED_DOME, PREFERRED_SWIRLER
from combustor.sizing.burnout import BURNOUT
from combustor.sizing.drill import DRILL_STEPS
from combustor.sizing.exit_pattern import pattern_factor_of
from combustor.sizing.fire import FUEL_DEMAND, FUEL_DEMAND_SIMPLE
from combustor.sizing.loop import AREAS
from combustor.sizing.record import Candidate, Dimension
from combustor.sizing.rounding import Rounded
from combustor.sizing.sketch import PREMIXER, SWIRLER
from combustor.sizing.state import State, Task


def dimensions_of(task: Task, state: State, rounded: Rounded) -> tuple[Dimension, ...]:
    """Return every sized dimension in the order it was found.

    Parameters
    ----------
    task : Task
    state : State
        Settled.
    rounded : Rounded
        The drilled metal.
    """
    groups = (
        _fuel(task),
        _casing(task, rounded),
        _liner(task, state, rounded),
        _diffuser(task, state),
        _zones(task, state, rounded),
        _budget(task, state),
        _swirler(task, state, rounded),
        _premixer(task, rounded),
        _rows(task, state, rounded),
        _films(task, state, rounded),
    )
    return tuple(dimension for group in groups for dimension in group)


def _fuel(task: Task) -> Iterator[Dimension]:
    duty = task.duty
    point = task.case.design_point
    if point.exit_temperature is None:
        yield Dimension("fuel flow", duty.fuel_flow, "mass_flow", diffuser.STATED)
        return
    rise = point.exit_temperature - duty.inlet.temperature
    simple = duty.inlet.mass_flow * duty.inlet.heat_capacity * rise / duty.lower_heating_value
    yield Dimension(
        "fuel flow",
        duty.fuel_flow,
        "mass_flow",
        FUEL_DEMAND,
        Candidate(simple, FUEL_DEMAND_SIMPLE, "heat capacity rises with temperature"),
        f"exit at {point.exit_temperature:.0f} K, overall equivalence ratio {duty.overall:.3f}",
    )


def _casing(task: Task, rounded: Rounded) -> Iterator[Dimension]:
    casing, metal = task.casing, rounded.hardware
    yield Dimension(
        "reference area", casing.area, "area", casing.method, casing.candidate, casing.note
    )
    note = f"rounded up; room for {1e3 * casing.room:.0f} mm"
    mean = task.section.mean_diameter
    if mean is None:
        yield Dimension("casing bore", metal.reference_height, "length", casing.method, None, note)
    else:
        height = metal.reference_height
        yield Dimension("casing height", height, "length", casing.method, None, note)
        mid = f"mean diameter {1e3 * mean:.0f} mm, that of the envelope"
        yield Dimension("casing outer diameter", mean + height, "length", casing.method, None, mid)
        yield Dimension("casing inner diameter", mean - height, "length", casing.method)
    velocity = task.duty.inlet.mass_flow / (task.duty.density * casing.area)
    yield Dimension("reference velocity", velocity, "velocity", casing.method)


def _liner(task: Task, state: State, rounded: Rounded) -> Iterator[Dimension]:
    frame, sketch = state.frame, rounded.sketch
    area = task.section.area(frame.liner_height)
    yield Dimension(
        "liner area ratio",
        area / task.casing.area,
        "ratio",
        frame.ratio_method,
        frame.ratio_candidate,
        frame.ratio_note,
    )
    what = "liner diameter" if task.section.is_round else "liner height"
    yield Dimension(what, frame.liner_height, "length", frame.ratio_method, None, "to 1 mm")
    if task.section.layout == "can-annular":
        gap = "half the hydraulic diameter of the air's passage between cans and casing"
    elif task.section.layout == "annular":
        gap = "outer and inner alike"
    else:
        gap = ""
    yield Dimension("annulus gap", sketch.annulus_gap, "length", frame.ratio_method, None, gap)
    yield Dimension(
        "annulus velocity",
        annulus_velocity(task, state, rounded),
        "velocity",
        liner_ratio.ANNULUS_VELOCITY,
    )


def annulus_velocity(task: Task, state: State, rounded: Rounded) -> float:
    """Return the cold velocity of all annulus air at the head of the annulus [m/s]."""
    share = 1.0 - state.budget.front
    area = rounded.sketch.annulus_area * task.section.cans
    return share * task.duty.inlet.mass_flow / (task.duty.density * area)


def _diffuser(task: Task, state: State) -> Iterator[Dimension]:
    taken, other = state.frame.diffuser, state.frame.rival_diffuser
    law = {"faired": diffuser.FAIRED_LOSS, "dump": diffuser.DUMP_LOSS_OVERALL}
    why = "more loss" if other.loss_coefficient > taken.loss_coefficient else "would stall"
    if task.case.targets.diffuser_kind is not None:
        why = "kind stated in the case"
    yield Dimension(
        "diffuser area ratio", taken.area_ratio, "ratio", diffuser.DIFFUSER_AREA, None, taken.kind
    )
    yield Dimension(
        "diffuser length",
        taken.length,
        "length",
        diffuser.DIFFUSER_LENGTH,
        Candidate(other.length, diffuser.DIFFUSER_LENGTH, f"{other.kind}: {why}"),
        f"included angle {math.degrees(taken.included_angle):.1f} deg, first stall at "
        f"{math.degrees(taken.stall_angle):.1f} deg",
    )
    stated = task.case.targets.diffuser_loss_coefficient is not None
    yield Dimension(
        "diffuser loss coefficient",
        taken.loss_coefficient,
        "ratio",
        diffuser.STATED if stated else law[taken.kind],
        Candidate(other.loss_coefficient, law[other.kind], f"{other.kind}: {why}"),
        "over the inlet dynamic head",
    )


def _zones(task: Task, state: State, rounded: Rounded) -> Iterator[Dimension]:
    frame, targets = state.frame, task.case.targets
    primary, secondary, end = frame.zone_ends
    height = frame.liner_height
    stated = diffuser.STATED
    yield Dimension(
        "primary zone length",
        primary,
        "length",
        zones.PRIMARY_LENGTH if targets.primary_length is None else stated,
        Candidate(
            zones.SHORTEST_PRIMARY_RATIO * height, zones.PRIMARY_LENGTH, "low end of the range"
        ),
        f"{primary / height:.2f} liner diameters",
    )
    note, by_rule = f"{(secondary - primary) / height:.2f} liner heights", zones.SECONDARY_LENGTH
    rival = None
    if task.burnout is not None:
        by_rule = BURNOUT
        note += (
            f"; CO from {1e6 * task.burnout.at_flame:.0f} to {1e6 * task.burnout.reached:.0f} ppm "
            f"in {1e3 * task.burnout.time:.1f} ms"
        )
        usual = zones.SECONDARY_LENGTH_RATIO * height
        rival = Candidate(usual, zones.SECONDARY_LENGTH, "blind to the flame")
    yield Dimension(
        "secondary zone length",
        secondary - primary,
        "length",
        by_rule if targets.secondary_length is None else stated,
        rival,
        note,
    )
    yield _dilution_length(task, state, end - secondary)
    reached = pattern_factor_of(rounded.hardware, task.duty.inlet, rounded.split)
    yield Dimension(
        "liner length",
        end,
        "length",
        zones.PATTERN_FACTOR,
        None,
        f"{end / height:.2f} liner diameters; pattern factor {reached:.3f}",
    )


def _dilution_length(task: Task, state: State, length: float) -> Dimension:
    frame = state.frame
    chart = frame.dilution_ratio_chart * frame.liner_height
    law = frame.length_ratio_needed * frame.liner_height - frame.zone_ends[1]
    if task.case.targets.dilution_length is not None:
        method, rival = diffuser.STATED, Candidate(chart, zones.DILUTION_LENGTH, "stated instead")
    elif abs(length - chart) <= 2e-3:
        method = zones.DILUTION_LENGTH
        rival = Candidate(law, zones.PATTERN_FACTOR, "shorter, and the casing has room for both")
    else:
        method = zones.PATTERN_FACTOR
        reason = "shorter" if chart < length else "longer than the casing has room for"
        rival = Candidate(chart, zones.DILUTION_LENGTH, reason)
    note = f"{length / frame.liner_height:.2f} liner diameters"
    return Dimension("dilution zone length", length, "length", method, rival, note)


def _budget(task: Task, state: State) -> Iterator[Dimension]:
    shares, targets = state.budget, task.case.targets
    stated = diffuser.STATED
    yield Dimension(
        "swirler air",
        shares.swirler,
        "fraction",
        AIR_BUDGET if targets.swirler_air is None else stated,
        _usual(shares.swirler, PREFERRED_SWIRLER),
    )
    yield Dimension(
        "dome air",
        shares.dome,
        "fraction",
        AIR_BUDGET if targets.dome_air is None else stated,
        _usual(shares.dome, PREFERRED_DOME),
    )
    if state.sketch.premixing is not None:
        yield Dimension("premixer air", shares.premixer, "fraction", AIR_BUDGET)
    turned = f"{task.case.model.primary_jet_share:.0%} of it turns upstream"
    for row in state.sketch.rows:
        method, note = AIR_BUDGET, ""
        if row.name == "primary":
            method, note = PRIMARY_JET_SHARE, turned
        share = shares.of_row(row.name)
        yield Dimension(f"{row.name} row air", share, "fraction", method, None, note)
    yield Dimension(
        "film air",
        shares.film,
        "fraction",
        cooling.FILM_AIR if targets.film_air is None else stated,
        Candidate(cooling.USUAL_FILM_AIR, cooling.FILM_AIR_SHARE, "a range, blind to the duty"),
        "" if state.film_plan is None else cooling.what_sets(state.film_plan),
    )
    yield Dimension("leakage", shares.leak, "fraction", stated)


def _premixer(task: Task, rounded: Rounded) -> Iterator[Dimension]:
    premixing = rounded.sketch.premixing
    if premixing is None:
        return
    opening, flow = rounded.hardware.opening(PREMIXER), rounded.split.opening(PREMIXER)
    vanes = opening.swirler
    assert vanes is not None
    velocity = premixer_velocity(task, rounded)
    yield Dimension(
        "premixer area",
        opening.area,
        "area",
        AREAS,
        None,
        f"one of {opening.count * task.section.cans}; passes "
        f"{flow.mass_flow / task.duty.inlet.mass_flow:.1%} of the air",
    )
    practice = front_ends.PREMIXER_PRACTICE
    yield Dimension("premixer hub diameter", vanes.hub_diameter, "length", AREAS, None, "to 0.1 mm")
    yield Dimension("premixer tip diameter", vanes.tip_diameter, "length", AREAS, None, "to 0.1 mm")
    yield Dimension("premixer velocity", velocity, "velocity", AREAS)
    yield Dimension(
        "premixer length",
        premixing.length,
        "length",
        practice,
        None,
        f"{1e3 * premixing.length / velocity:.2f} ms at the design point",
    )
    share = premixing.pilot_fuel
    yield Dimension("pilot fuel", share, "fraction", front_ends.LEAN_PRACTICE)
    own = (1.0 - share) * task.duty.overall * task.duty.inlet.mass_flow / flow.mass_flow
    yield Dimension("premixer equivalence ratio", own, "ratio", AIR_BUDGET)
    pilot = rounded.split.opening(SWIRLER).mass_flow
    rich = share * task.duty.overall * task.duty.inlet.mass_flow / pilot
    yield Dimension("pilot equivalence ratio", rich, "ratio", AIR_BUDGET)


def premixer_velocity(task: Task, rounded: Rounded) -> float:
    """Return the axial velocity of the air through the premixing passage [m/s]."""
    opening, flow = rounded.hardware.opening(PREMIXER), rounded.split.opening(PREMIXER)
    area = opening.count * opening.area * task.section.cans
    return flow.mass_flow / (flow.jet_density * area)


def _usual(share: float, usual: float) -> Candidate | None:
    if abs(share - usual) < 1e-9:
        return None
    return Candidate(usual, DOME_SHARES, "usual, but would miss the zone equivalence ratios")


def _swirler(task: Task, state: State, rounded: Rounded) -> Iterator[Dimension]:
    opening = rounded.hardware.opening(SWIRLER)
    vanes = opening.swirler
    assert vanes is not None
    flow = rounded.split.opening(SWIRLER)
    head = (
        0.5
        * task.duty.density
        * (task.duty.inlet.mass_flow / (task.duty.density * task.casing.area)) ** 2
    )
    ratio = swirler.swirler_area_ratio(
        state.budget.swirler,
        (flow.driving_pressure - flow.liner_pressure) / head,
        vanes.vane_angle,
        vanes.vane_loss,
        task.section.area(state.frame.liner_height) / task.casing.area,
    )
    yield Dimension(
        "swirler area",
        opening.area,
        "area",
        AREAS,
        Candidate(
            ratio * task.casing.area / task.section.cans / opening.count,
            swirler.SWIRLER_AREA,
            "by its equation on the drop to liner static; the split counts the drop to total",
        ),
        f"passes {flow.mass_flow / task.duty.inlet.mass_flow:.1%} of the air",
    )
    yield Dimension(
        "swirler hub diameter",
        vanes.hub_diameter,
        "length",
        swirler.VANE_PRACTICE,
        None,
        "to 0.1 mm",
    )
    yield Dimension("swirler tip diameter", vanes.tip_diameter, "length", AREAS, None, "to 0.1 mm")
    yield Dimension("swirler vane angle", vanes.vane_angle, "angle", swirler.VANE_PRACTICE)
    if opening.count > 1:
        pitch = math.pi * (task.section.mean_diameter or 0.0) / opening.count
        stated = task.case.targets.swirlers is not None
        yield Dimension(
            "swirlers",
            opening.count,
            "count",
            diffuser.STATED if stated else swirler.SWIRLER_COUNT,
            None,
            f"pitch {1e3 * pitch:.0f} mm at the mean diameter",
        )
    yield Dimension("swirler vanes", vanes.vane_count, "count", swirler.VANE_PRACTICE)
    number = swirler.swirl_number(vanes.hub_diameter, vanes.tip_diameter, vanes.vane_angle)
    yield Dimension("swirl number", number, "ratio", swirler.SWIRL_NUMBER)
    yield Dimension(
        "swirler recirculation",
        swirler.recirculated_share(number),
        "ratio",
        swirler.RECIRCULATION,
        None,
        "recirculated over swirler air, order of magnitude; about "
        f"{2e3 * vanes.tip_diameter:.0f} mm long",
    )


def _rows(task: Task, state: State, rounded: Rounded) -> Iterator[Dimension]:
    targets = task.case.targets
    stated = {
        "primary": targets.primary_holes,
        "secondary": targets.secondary_holes,
        "dilution": targets.dilution_holes,
    }
    sketch = rounded.sketch
    for row in sketch.rows:
        plan, each = state.plans[row.name], row.count // len(sketch.sides)
        many = "" if len(sketch.sides) == 1 else f", {each} in either wall, opposed in line"
        yield Dimension(
            f"{row.name} row: holes",
            row.count,
            "count",
            rows.ROW_COUNT if stated[row.name] is None else diffuser.STATED,
            Candidate(
                plan.best_mixing_count,
                rows.HOLDEMAN_COUNT,
                "best mixing; the jets' reach was put first",
            ),
            (plan.bound or f"{plan.free_count:.2f} before rounding") + many,
        )
        yield Dimension(f"{row.name} row: position", row.station, "length", rows.ROW_POSITION)
        for name, shape in zip(sketch.names(row.name), sketch.sides, strict=True):
            yield from _holes(task, state, rounded, name, shape.perimeter / each)


def _holes(
    task: Task, state: State, rounded: Rounded, name: str, pitch: float
) -> Iterator[Dimension]:
    flow = rounded.split.opening(name)
    diameter = _diameter(rounded.hardware.opening(name))
    assert state.fit is not None
    exact = _diameter(state.fit.hardware.opening(name))
    yield Dimension(
        f"{name} row: hole diameter",
        diameter,
        "length",
        AREAS,
        Candidate(exact, DRILL_STEPS, "before rounding to a drill"),
        f"{pitch / diameter:.1f} diameters from hole to hole",
    )
    yield Dimension(
        f"{name} row: penetration",
        flow.penetration or 0.0,
        "length",
        PENETRATION_ROW,
        Candidate(
            rows.wanted_penetration(task.section, state.frame.liner_height),
            rows.ROW_COUNT,
            "aimed at; the whole count gives the value shown",
        ),
        f"momentum ratio {flow.momentum_flux_ratio:.1f}",
    )


def _films(task: Task, state: State, rounded: Rounded) -> Iterator[Dimension]:
    slots, film_plan = rounded.sketch.slots, state.film_plan
    assert film_plan is not None
    targets = task.case.targets
    stations = [ring.station for ring in slots]
    pitches = [
        b - a for a, b in zip(stations, [*stations[1:], state.frame.liner_length], strict=True)
    ]
    yield Dimension("film slots", len(slots), "count", film_slots.SLOT_PITCH)
    yield Dimension(
        "film slot pitch, widest",
        max(pitches),
        "length",
        film_slots.SLOT_PITCH if targets.slot_pitch is None else diffuser.STATED,
        None,
        f"closest {1e3 * min(pitches):.0f} mm",
    )
    yield Dimension(
        "film slot height",
        slots[0].height,
        "length",
        film_slots.SLOT_HEIGHT if targets.slot_height is None else diffuser.STATED,
    )
    yield Dimension("film slot lip", slots[0].lip_thickness, "length", film_slots.SLOT_HEIGHT)
    for ring, peak, point in zip(slots, film_plan.peak, film_plan.point, strict=True):
        openings = [rounded.hardware.opening(name) for name in rounded.sketch.names(ring.name)]
        opening = openings[0]
        inner = "".join(f"; inner wall {one.count}" for one in openings[1:])
        yield Dimension(
            f"{ring.name}: metering holes",
            opening.count,
            "count",
            film_slots.METERING_HOLES,
            None,
            f"{1e3 * _diameter(opening):.1f} mm at x {1e3 * ring.station:.0f} mm; panel "
            f"reaches {peak:.0f} K at {point}{inner}",
        )


def _diameter(opening: Opening) -> float:
    assert opening.diameter is not None
    return opening.diameter
