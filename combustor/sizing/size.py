"""From targets to metal: the steps of sizing, in order."""

from __future__ import annotations

from combustor.base.convergence import Convergence
from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case, Combustor
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.sizing.air_budget import PREFERRED_DOME, PREFERRED_SWIRLER
from combustor.sizing.burnout import burnout_of
from combustor.sizing.casing import casing_of
from combustor.sizing.dimensions import dimensions_of
from combustor.sizing.draft import first_state
from combustor.sizing.duty import Duty, duty_of
from combustor.sizing.findings import findings_of
from combustor.sizing.frame import highest_annulus_velocity
from combustor.sizing.passes import next_state
from combustor.sizing.record import Design
from combustor.sizing.rounding import Rounded, round_to_drills
from combustor.sizing.section import Section
from combustor.sizing.state import State, Task
from combustor.sizing.wall_duty import radiation_of, wall_duties

FREE_PASSES = 8
FROZEN_PASSES = 12
SETTLED = 1e-5
LEAST_JET_SHARE = 0.2
FRONT_END_RANGE = {
    "diffusion": (0.3, 2.0),
    "rich-lean": (1.15, 2.5),
    "lean-premixed": (0.3, 0.8),
}


def size(case: Case, fuel: Fuel, gas: Gas) -> Design:
    """Return the metal that meets the targets of a case at its design point.

    Parameters
    ----------
    case : Case
        Its ``[hardware]`` is not read.
    fuel : Fuel
    gas : Gas
        Loaded with the fuel's mechanism.

    Returns
    -------
    Design
        Whole holes and drillable diameters; ``Design.converged`` says whether the re-solved
        zones lie within 0.03 and the loss within 0.1 points of their targets.

    Raises
    ------
    InputError
        An entry that sizing needs is missing, or does not go with the front end.
    InfeasibleError
        The targets cannot be met together; carries the chain of causes.
    """
    refuse_unsized(case)
    task = task_of(case, fuel, gas)
    state, change, passes = settle(task)
    rounded = round_to_drills(task, state)
    return Design(
        hardware=rounded.hardware,
        dimensions=dimensions_of(task, state, rounded),
        findings=findings_of(task, state, rounded),
        split=rounded.split,
        zones=rounded.zones,
        pressure_loss_target=case.targets.pressure_loss or 0.0,
        fuel_flow=task.duty.fuel_flow,
        convergence=_convergence(state, change, passes, rounded),
    )


def task_of(case: Case, fuel: Fuel, gas: Gas) -> Task:
    """Return the duty of the design point and the casing that takes it."""
    duty = duty_of(case, fuel, gas)
    section = section_of(case.combustor)
    assert case.targets.pressure_loss is not None
    casing = casing_of(
        duty,
        section,
        case.combustor.layout,
        case.targets.pressure_loss,
        room_of(case.combustor),
        highest_annulus_velocity(duty, case.targets),
        1.0 - _front_share(case, duty),
    )
    burnout = None
    if case.targets.front_end == "lean-premixed":
        wanted = case.targets.equivalence_ratio.primary
        burnout = burnout_of(case, fuel, gas, duty.supply, duty.fuel_flow, wanted)
    return Task(
        case, duty, section, casing, burnout, wall_duties(case, fuel, gas, duty), radiation_of(fuel)
    )


def _front_share(case: Case, duty: Duty) -> float:
    """Return the share of the air that does not pass the annulus, before any budget."""
    if case.targets.front_end == "diffusion":
        return PREFERRED_SWIRLER + PREFERRED_DOME
    return min(duty.overall / case.targets.equivalence_ratio.primary, 0.9)


def section_of(combustor: Combustor) -> Section:
    """Return the shape of casing and liner; a ring keeps the mean diameter of its envelope."""
    outer, inner = combustor.casing_outer_diameter, combustor.casing_inner_diameter
    if combustor.layout == "can" or outer is None or inner is None:
        return Section(combustor.cans)
    return Section(combustor.cans, 0.5 * (outer + inner))


def room_of(combustor: Combustor) -> float:
    """Return the casing diameter or ring height there is room for [m]."""
    if combustor.layout == "can":
        assert combustor.casing_diameter is not None  # required of a case without metal
        return combustor.casing_diameter
    outer, inner = combustor.casing_outer_diameter, combustor.casing_inner_diameter
    assert outer is not None and inner is not None  # likewise
    return 0.5 * (outer - inner)


def settle(task: Task) -> tuple[State, float, int]:
    """Return the state the passes settle on, the last change of any share, and their number.

    Lengths, counts and positions follow until they repeat, then they are held while the
    shares settle.
    """
    state = first_state(task)
    passes = 0
    for _ in range(FREE_PASSES):
        before, state = state, next_state(task, state, frozen=False)
        passes += 1
        if state.sketch == before.sketch and _change(before, state) < SETTLED:
            break
    change = 1.0
    for _ in range(FROZEN_PASSES):
        before, state = state, next_state(task, state, frozen=True)
        passes += 1
        change = _change(before, state)
        if change < SETTLED:
            break
    return state, change, passes


def refuse_unsized(case: Case) -> None:
    """Refuse what sizing does not know, and what it cannot do without; all at once.

    Raises
    ------
    InputError
    """
    combustor, targets = case.combustor, case.targets
    problems = []
    low, high = FRONT_END_RANGE[targets.front_end]
    if not low <= targets.equivalence_ratio.primary <= high:
        problems.append(
            Problem(
                f"not that of a {targets.front_end} front end",
                f"{low} to {high}",
                "targets.equivalence_ratio.primary",
                targets.equivalence_ratio.primary,
            )
        )
    is_diffusion = targets.front_end == "diffusion"
    if is_diffusion and case.model.primary_jet_share < LEAST_JET_SHARE:
        problems.append(
            Problem(
                "too little of the primary row turns upstream to size the row by",
                f"{LEAST_JET_SHARE} to 1; about 0.5 is usual",
                "model.primary_jet_share",
                case.model.primary_jet_share,
            )
        )
    needed: dict[str, object] = {
        "targets.pressure_loss": targets.pressure_loss,
        "combustor.casing_length": combustor.casing_length,
        "combustor.inlet_annulus": combustor.inlet_annulus,
        "combustor.exit_annulus": combustor.exit_annulus,
    }
    if combustor.layout == "can":
        needed["combustor.casing_diameter"] = combustor.casing_diameter
    else:
        needed["combustor.casing_outer_diameter"] = combustor.casing_outer_diameter
        needed["combustor.casing_inner_diameter"] = combustor.casing_inner_diameter
    problems += [
        Problem("missing", "sizing needs it", key) for key, value in needed.items() if value is None
    ]
    if problems:
        raise InputError(problems)


def _change(before: State, after: State) -> float:
    if before.shares.keys() != after.shares.keys():
        return 1.0
    return max(abs(after.shares[name] - before.shares[name]) for name in after.shares)


def _convergence(state: State, change: float, passes: int, rounded: Rounded) -> Convergence:
    assert state.fit is not None
    fit = state.fit.convergence
    messages = []
    if not fit.converged:
        messages.append(fit.message)
    if change >= SETTLED:
        messages.append("air shares do not settle")
    if rounded.miss > 1.0:
        messages.append("whole holes and drill sizes miss a target by more than its tolerance")
    if not rounded.split.convergence.converged:
        messages.append(rounded.split.convergence.message)
    return Convergence(not messages, rounded.miss, passes, "; ".join(messages))
