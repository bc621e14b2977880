"""Judgements on a sized design."""

from __future__ import annotations

import math
from collections.abc import Iterator

from combustor.base.finding import Finding, Level
from combustor.base.method import Method
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
from combustor.sizing.burnout import BURNOUT
from combustor.sizing.casing import (
    ATMOSPHERE,
    HEAT_RELEASE,
    HIGHEST_HEAT_RELEASE,
    loading_of,
)
from combustor.sizing.dimensions import annulus_velocity, premixer_velocity
from combustor.sizing.exit_pattern import pattern_factor_of
from combustor.sizing.held_back import FILM_HELD_BACK
from combustor.sizing.reference_area import (
    CHEMICAL_LOADING,
    RELIGHT_LOADING,
    REQUIRED_LOADING,
)
from combustor.sizing.rounding import LOSS_TOLERANCE, ZONE_TOLERANCE, Rounded
from combustor.sizing.sketch import SWIRLER
from combustor.sizing.state import State, Task

HEAD_RATIO = Method(
    key="hole-head-ratio",
    quantity="jet head over annulus head",
    source="design practice: at least 4 for holes in a liner wall",
    reading="common practice, no source",
)
LINER_SHARE = Method(
    key="liner-loss-share",
    quantity="loss over the liner",
    source="design practice: at least 2.5 % of the inlet pressure for strong jets",
    reading="common practice, no source",
)

LEAST_HEAD_RATIO = 4.0
LEAST_LINER_LOSS = 0.025
SHALLOW, DEEP = 0.6, 1.3


def findings_of(task: Task, state: State, rounded: Rounded) -> tuple[Finding, ...]:
    """Return what there is to say about a design, broken limits first.

    Parameters
    ----------
    task : Task
    state : State
        Settled.
    rounded : Rounded
        The drilled metal.
    """
    groups = (
        _targets(task, rounded),
        _pattern(task, state, rounded),
        _wall(task, state, rounded),
        _loading(task, rounded),
        _annulus(task, state, rounded),
        _diffuser(task, state, rounded),
        _jets(task, state, rounded),
        _swirler(rounded),
        _front_end(task, state, rounded),
        _held_back(task, state),
        _liner(task, rounded),
        _water(task),
    )
    found = [finding for group in groups for finding in group]
    rank = {"act": 0, "watch": 1, "ok": 2}
    return tuple(sorted(found, key=lambda finding: rank[finding.level]))


def _targets(task: Task, rounded: Rounded) -> Iterator[Finding]:
    for zone in rounded.zones:
        miss = abs(zone.reached - zone.wanted)
        yield Finding(
            "ok" if miss <= ZONE_TOLERANCE else "act",
            f"equivalence ratio of the {zone.name} zone",
            zone.reached,
            zone.wanted,
            "-",
            "" if miss <= ZONE_TOLERANCE else "state a finer drill_step",
            "air split of the drilled metal",
        )
    wanted = task.case.targets.pressure_loss or 0.0
    miss = abs(rounded.split.pressure_loss - wanted)
    yield Finding(
        "ok" if miss <= LOSS_TOLERANCE else "act",
        "pressure loss at the design point",
        100.0 * rounded.split.pressure_loss,
        100.0 * wanted,
        "%",
        "" if miss <= LOSS_TOLERANCE else "state a finer drill_step",
        "air split of the drilled metal",
    )


def _pattern(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    wanted = task.case.targets.pattern_factor
    reached = pattern_factor_of(rounded.hardware, task.duty.inlet, rounded.split)
    is_met = reached <= wanted + 5e-4
    yield Finding(
        "ok" if is_met else "act",
        "pattern factor",
        reached,
        wanted,
        "-",
        ""
        if is_met
        else f"lengthen the liner by about "
        f"{1e3 * _missing_length(state, wanted, reached):.0f} mm or allow more pressure_loss",
        zones.PATTERN_FACTOR.citation,
    )
    chart = state.frame.dilution_ratio_chart * state.frame.liner_height
    length = state.frame.liner_length - state.frame.zone_ends[1]
    if length < chart - 2e-3:
        yield Finding(
            "watch",
            "dilution zone length",
            1e3 * length,
            1e3 * chart,
            "mm",
            "the charts ask for more length than the casing has; the pattern factor rests on "
            "the law over the whole liner",
            zones.DILUTION_LENGTH.citation,
        )
    for notice in state.frame.notices:
        yield Finding(
            "watch", f"{notice.method}: {notice.quantity}", notice.value, advice=str(notice)
        )


def _missing_length(state: State, wanted: float, reached: float) -> float:
    ratio = math.log(1.0 - reached) / math.log(1.0 - wanted)
    return state.frame.liner_length * (ratio - 1.0)


def _wall(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    plan = state.film_plan
    assert plan is not None
    peak = max(plan.peak)
    level: Level = "ok" if plan.is_cool else "watch"
    if peak > task.case.targets.wall_temperature:
        level = "act"
    yield Finding(
        level,
        f"peak wall temperature, at {plan.point[plan.peak.index(peak)]}",
        peak,
        task.case.targets.wall_temperature,
        "K",
        ""
        if level == "ok"
        else "closer or higher slots, a coating, more film_air, or a higher wall_temperature",
        cooling.FILM_AIR.citation,
    )
    yield from _metering(rounded)


def _metering(rounded: Rounded) -> Iterator[Finding]:
    low, high = film_slots.METERING_HOLES.validity["pitch_over_diameter"]
    pitches = {}
    for ring in rounded.sketch.slots:
        for name, shape in zip(rounded.sketch.names(ring.name), rounded.sketch.sides, strict=True):
            opening = rounded.hardware.opening(name)
            assert opening.diameter is not None
            pitches[name] = rows.pitch_over_diameter(
                shape.perimeter, opening.count, opening.diameter
            )
    for limit, name in (
        (high, max(pitches, key=lambda name: pitches[name])),
        (low, min(pitches, key=lambda name: pitches[name])),
    ):
        is_sparse = limit == high
        if (pitches[name] > high) if is_sparse else (pitches[name] < low):
            count = sum(not low <= pitch <= high for pitch in pitches.values())
            yield Finding(
                "watch",
                f"pitch over diameter of metering holes, worst at {name}",
                pitches[name],
                limit,
                "-",
                ("more film_air or a lower slot_height" if is_sparse else "a higher slot_height")
                + f"; {count} of {len(pitches)} slots lie outside",
                film_slots.METERING_HOLES.citation,
            )


def _loading(task: Task, rounded: Rounded) -> Iterator[Finding]:
    loadings = loading_of(task.duty, task.section, rounded.hardware.reference_height)
    for point in task.duty.points:
        needed, reached = REQUIRED_LOADING[point.kind], loadings[point.name]
        is_relight = point.kind == "relight"
        level: Level = "ok" if reached >= needed else "act"
        if is_relight:
            level = "watch"
        yield Finding(
            level,
            f"chemical loading at {point.name}",
            reached / 1e6,
            needed / 1e6,
            "1e6",
            "low confidence: 1e6 to 5e6 seen at relight" if is_relight else "",
            (RELIGHT_LOADING if is_relight else CHEMICAL_LOADING).citation,
        )


def _annulus(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    velocity = annulus_velocity(task, state, rounded)
    most = liner_ratio.HIGHEST_ANNULUS_VELOCITY
    least = liner_ratio.LOWEST_ANNULUS_VELOCITY
    is_slow = velocity < least
    is_good = least <= velocity <= 1.02 * most
    yield Finding(
        "ok" if is_good else "watch",
        "annulus velocity",
        velocity,
        least if is_slow else most,
        "m/s",
        "" if is_good else ("a larger liner" if is_slow else "a smaller liner or a wider casing"),
        liner_ratio.ANNULUS_VELOCITY.citation,
    )
    mach = velocity / task.duty.speed_of_sound
    if mach > 1.02 * liner_ratio.HIGHEST_ANNULUS_MACH:
        yield Finding(
            "watch",
            "annulus Mach number",
            mach,
            liner_ratio.HIGHEST_ANNULUS_MACH,
            "-",
            "a smaller liner or a wider casing",
            liner_ratio.ANNULUS_VELOCITY.citation,
        )


def _diffuser(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    shape = state.frame.diffuser
    if shape.area_ratio > 1.0 and shape.included_angle > diffuser.STALL_MARGIN * shape.stall_angle:
        level: Level = "act" if shape.is_stalled else "watch"
        yield Finding(
            level,
            "diffuser included angle",
            math.degrees(shape.included_angle),
            math.degrees(shape.stall_angle),
            "deg",
            "a dump diffuser, a wider inlet_annulus or a longer diffuser",
            diffuser.DIFFUSER_LENGTH.citation,
        )
    for notice in rounded.split.notices:
        yield Finding(
            "watch",
            f"{notice.quantity} {notice.where}".strip(),
            notice.value,
            advice=str(notice),
            source=notice.method,
        )


def _jets(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    depth = rows.wanted_penetration(task.section, state.frame.liner_height)
    sketch = rounded.sketch
    jets = [
        (name, shape)
        for row in sketch.rows
        for name, shape in zip(sketch.names(row.name), sketch.sides, strict=True)
    ]
    for name, shape in jets:
        flow, opening = rounded.split.opening(name), rounded.hardware.opening(name)
        assert opening.diameter is not None
        yield from _weak_jets(name, flow.head_ratio, flow.momentum_flux_ratio)
        reach = (flow.penetration or 0.0) / depth
        if not SHALLOW <= reach <= DEEP:
            yield Finding(
                "watch",
                f"penetration of the {name} row",
                1e3 * (flow.penetration or 0.0),
                1e3 * depth,
                "mm",
                "fewer, larger holes" if reach < SHALLOW else "more, smaller holes",
                rows.ROW_COUNT.citation,
            )
        pitch = rows.pitch_over_diameter(shape.perimeter, opening.count, opening.diameter)
        if pitch < rows.LEAST_PITCH:
            yield Finding(
                "act",
                f"pitch over diameter of the {name} row",
                pitch,
                rows.LEAST_PITCH,
                "-",
                "fewer holes in the row, or a second row",
                rows.ROW_PITCH.citation,
            )


def _weak_jets(name: str, head_ratio: float, momentum_ratio: float) -> Iterator[Finding]:
    if head_ratio < LEAST_HEAD_RATIO:
        yield Finding(
            "watch",
            f"head ratio of the {name} row",
            head_ratio,
            LEAST_HEAD_RATIO,
            "-",
            "a wider annulus (smaller liner) or more pressure_loss",
            HEAD_RATIO.citation,
        )
    if momentum_ratio < rows.WEAK_MOMENTUM_RATIO:
        yield Finding(
            "watch",
            f"momentum ratio of the {name} row",
            momentum_ratio,
            rows.WEAK_MOMENTUM_RATIO,
            "-",
            "a larger reference area",
            rows.HOLDEMAN_COUNT.citation,
        )


def _swirler(rounded: Rounded) -> Iterator[Finding]:
    vanes = rounded.hardware.opening(SWIRLER).swirler
    assert vanes is not None
    number = swirler.swirl_number(vanes.hub_diameter, vanes.tip_diameter, vanes.vane_angle)
    least = swirler.SWIRL_NUMBER.validity["swirl_number"][0]
    yield Finding(
        "ok" if number >= least else "watch",
        "swirl number",
        number,
        least,
        "-",
        "" if number >= least else "a larger vane angle, or a larger hub",
        swirler.SWIRL_NUMBER.citation,
    )
    notices = swirler.VANE_PRACTICE.notices(
        "swirler",
        vane_angle=vanes.vane_angle,
        vane_count=vanes.vane_count,
        vane_thickness=vanes.vane_thickness,
    )
    for notice in notices:
        yield Finding("watch", f"swirler {notice.quantity}", notice.value, advice=str(notice))


def _held_back(task: Task, state: State) -> Iterator[Finding]:
    budget, burnout = state.budget, task.burnout
    if budget.film_asked > budget.film + 1e-4:
        yield Finding(
            "act",
            "film air, held back by the air budget",
            100.0 * budget.film,
            100.0 * budget.film_asked,
            "%",
            "the wall will run hotter than its target: raise the zone equivalence ratios or "
            "wall_temperature, add a coating, or lower exit_temperature",
            FILM_HELD_BACK.citation,
        )
    if burnout is not None and burnout.reached > burnout.wanted:
        yield Finding(
            "act",
            "CO at the end of burn-out",
            1e6 * burnout.reached,
            1e6 * burnout.wanted,
            "ppm",
            "the flame holds more CO at equilibrium: lower equivalence_ratio.primary, or allow "
            "more CO (cooling by film and dilution air burns some of it)",
            BURNOUT.citation,
        )


def _front_end(task: Task, state: State, rounded: Rounded) -> Iterator[Finding]:
    wanted, budget = task.case.targets.equivalence_ratio, state.budget
    practices: list[tuple[Method, str, str, float]] = []
    if task.front_end == "rich-lean":
        practice = front_ends.RICH_LEAN_PRACTICE
        practices = [
            (practice, "rich", "equivalence ratio of the rich zone", wanted.primary),
            (practice, "lean", "equivalence ratio behind the quench row", wanted.secondary),
        ]
    elif task.front_end == "lean-premixed":
        lean, made = front_ends.LEAN_PRACTICE, front_ends.PREMIXER_PRACTICE
        velocity = premixer_velocity(task, rounded)
        assert rounded.sketch.premixing is not None
        time = rounded.sketch.premixing.length / velocity
        practices = [
            (lean, "lean", "equivalence ratio of the lean flame", wanted.primary),
            (lean, "front_share", "share of the air through the front end", budget.front),
            (made, "premixer_velocity", "velocity in the premixer, m/s", velocity),
            (made, "residence_time", "residence time in the premixer, s", time),
        ]
    for method, quantity, what, value in practices:
        low, high = method.validity[quantity]
        is_usual = low <= value <= high
        yield Finding(
            "ok" if is_usual else "watch",
            what,
            value,
            high if value > high else low,
            "-",
            "" if is_usual else f"outside {low:g} to {high:g}, the usual range",
            method.citation,
        )


def _liner(task: Task, rounded: Rounded) -> Iterator[Finding]:
    share = rounded.split.pressure_loss_parts["liner"]
    if share < LEAST_LINER_LOSS:
        yield Finding(
            "watch",
            "loss over the liner",
            100.0 * share,
            100.0 * LEAST_LINER_LOSS,
            "%",
            "more pressure_loss, or less of it in the diffuser",
            LINER_SHARE.citation,
        )
    metal = rounded.hardware
    heat = task.duty.fuel_flow * task.duty.lower_heating_value
    volume = metal.volume(0.0, metal.liner_length)
    highest = HIGHEST_HEAT_RELEASE / 1e6
    rate = heat / volume / (task.duty.inlet.pressure / ATMOSPHERE) / 1e6
    yield Finding(
        "ok" if rate <= highest else "watch",
        "space heating rate",
        rate,
        highest,
        "MW/m3/atm",
        "" if rate <= highest else "a larger or longer liner",
        HEAT_RELEASE.citation,
    )


def _water(task: Task) -> Iterator[Finding]:
    injected = task.case.design_point.water_injection
    if injected > 0.0:
        yield Finding(
            "watch",
            "water injection at the design point",
            injected,
            None,
            "kg/s",
            "sizing leaves the injected water out: fuel flow and loss come out low",
        )
