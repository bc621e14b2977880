"""Compliance pre-check: rated emissions against every limit that binds, with margins."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import date
from pathlib import Path

from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case, Point
from combustor.emissions.applicability import Binding, rows_binding, set_binds
from combustor.emissions.facts import Answer, Facts
from combustor.emissions.landing_takeoff import TIME_IN_MODE, Mode, mass_per_thrust
from combustor.emissions.limit import FuelOfLimit
from combustor.emissions.reference_day import AmbientAir, aircraft_humidity_factor
from combustor.emissions.rule_set import RuleSet, find_rules, names
from combustor.emissions.stack import FactMissing, Stack, stack_of
from combustor.emissions.verdict import Subject, Verdict, verdict_on
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.rating.rate import rate_case
from combustor.rating.record import PointRating, Ratings
from combustor.studies.close_gap import Gap, gaps_of
from combustor.studies.machine_facts import facts_at, facts_of, fuel_sulfur

CYCLE = "landing and take-off"
_MODES = {
    "take-off": "take-off",
    "takeoff": "take-off",
    "climb": "climb",
    "climb-out": "climb",
    "approach": "approach",
    "idle": "idle",
    "taxi": "idle",
}


@dataclass(frozen=True)
class Standing:
    """Whether a row (or a whole set, ``row`` empty) binds, at which points, and why not.

    ``binds`` is None where facts are missing.
    """

    rule: str
    row: str
    points: tuple[str, ...]
    binds: bool | None
    why: str


@dataclass(frozen=True)
class ComplyCheck:
    """Everything a pre-check found.

    Parameters
    ----------
    title, case_sha256, fuel : str
    verdicts : tuple of Verdict
        Every limit that binds or may bind, at every point.
    standings : tuple of Standing
    gaps : tuple of Gap
        What would close those that are not inside.
    stacks : mapping of str to Stack
        By operating point, those that burn.
    rules : tuple of RuleSet
        All that were looked at.
    facts : Facts
    overdue : tuple of str
        Sets past their review date.
    notes : tuple of str
    cautions : tuple of str
        Of the fuel.
    burnt : Fuel
    ratings : Ratings
    leaning_on : tuple of str
        Facts taken from the case, not stated, by which a named set or row was left out.
    """

    title: str
    case_sha256: str
    fuel: str
    verdicts: tuple[Verdict, ...]
    standings: tuple[Standing, ...]
    gaps: tuple[Gap, ...]
    stacks: Mapping[str, Stack]
    rules: tuple[RuleSet, ...]
    facts: Facts
    overdue: tuple[str, ...]
    notes: tuple[str, ...]
    cautions: tuple[str, ...]
    burnt: Fuel
    ratings: Ratings
    leaning_on: tuple[str, ...] = ()

    @property
    def inside(self) -> bool | None:
        """Whether every limit that binds is kept: of a choice, one option at each point.

        None where no limit binds; False where that rests on a fact nobody stated.
        """
        if self.leaning_on:
            return False
        if not self.verdicts:
            return None
        open_choices: dict[tuple[str, str], bool] = {}
        for verdict in self.verdicts:
            good = verdict.verdict == "inside"
            if verdict.choice:
                place = (verdict.point, verdict.choice)
                open_choices[place] = open_choices.get(place, False) or good
            elif not good:
                return False
        return all(open_choices.values())


def comply(
    case: Case,
    rules: Sequence[str] | None = None,
    points: Sequence[str] | None = None,
    today: date | None = None,
    ratings: Ratings | None = None,
) -> ComplyCheck:
    """Hold a case against emission rules.

    Parameters
    ----------
    case : Case
        Its ``[rules]`` give the facts.
    rules : sequence of str, optional
        Names of shipped sets or paths; those of the case when left out. Where neither names
        any, every shipped set is looked at.
    points : sequence of str, optional
        Operating points wanted; all when left out.
    today : date, optional
        Against which review dates are held.
    ratings : Ratings, optional
        Of the same case, to spare rating it.

    Raises
    ------
    InputError
        A rule set that does not exist or is wrong, a confirmation of no row, modes given twice.
    """
    named = tuple(rules) if rules else case.rules.names
    folder = Path(case.file).parent if case.file else Path()
    sets = tuple(find_rules(name, folder) for name in named or names())
    confirmed = _confirmed(case, sets)
    fuel = fuel_of(case)
    found = ratings if ratings is not None else rate_case(case, points=points)
    facts = facts_of(case, fuel, found)
    stacks = {rated.name: _stack(case, fuel, rated) for rated in found.points if rated.emissions}
    subjects = [_subject(case, fuel, facts, rated, stacks) for rated in found.points]
    cycle = _cycle(case, fuel, facts, found, stacks)
    own = case.rules.scatter.model_dump(exclude_none=True)
    verdicts: list[Verdict] = []
    standings: list[Standing] = []
    leaning: set[str] = set()
    for rule_set in sets:
        answer = set_binds(rule_set, facts)
        if answer.holds is False or (answer.holds is None and not named):
            standings.append(_set_standing(rule_set, answer))
            if answer.holds is None:
                verdicts.append(_undecided_set(rule_set, answer))
            elif named:
                leaning |= answer.used & facts.derived.keys()
            continue
        standings.append(_set_standing(rule_set, answer))
        by_cycle = any(row.emission_unit.kind == "thrust" for row in rule_set.table.limits)
        judged = [cycle] if by_cycle else subjects
        made, places, by_derived = _of_set(rule_set, answer, judged, confirmed, own)
        verdicts += made
        standings += places
        leaning |= by_derived
    day = today or date.today()
    return ComplyCheck(
        title=case.title,
        case_sha256=case.sha256,
        fuel=fuel.name,
        verdicts=tuple(verdicts),
        standings=tuple(standings),
        gaps=gaps_of(case, found, verdicts),
        stacks=stacks,
        rules=sets,
        facts=facts,
        overdue=tuple(s.name for s in sets if s.table.review < day),
        notes=_notes(case, facts, fuel, leaning),
        cautions=fuel.cautions,
        burnt=fuel,
        ratings=found,
        leaning_on=tuple(sorted(leaning)),
    )


def _of_set(
    rules: RuleSet,
    answer: Answer,
    subjects: Iterable[Subject],
    confirmed: frozenset[str],
    scatter: Mapping[str, float],
) -> tuple[list[Verdict], list[Standing], set[str]]:
    verdicts = []
    leaning: set[str] = set()
    seen: dict[tuple[str, bool | None, str], list[str]] = {}
    for subject in subjects:
        for binding in rows_binding(rules, subject.facts):
            binds, why = binding.answer.holds, _why(binding)
            if binds and answer.holds is None:
                binds, why = None, _needs(answer)
            place = (binding.row.row, binds, why)
            seen.setdefault(place, []).append(subject.name)
            if binding.answer.holds is False:
                leaning |= binding.answer.used & subject.facts.derived.keys()
                continue
            verdicts.append(
                verdict_on(rules, binding, subject, confirmed, scatter, answer.missing, answer.used)
            )
    standings = [
        Standing(rules.name, row, tuple(points), binds, why)
        for (row, binds, why), points in seen.items()
    ]
    return verdicts, standings, leaning


def _why(binding: Binding) -> str:
    answer = binding.answer
    if answer.holds is None:
        return _needs(answer)
    return "" if answer.holds else "; ".join(answer.why_not)


def _needs(answer: Answer) -> str:
    return f"needs {', '.join(sorted(answer.missing))}"


def _set_standing(rules: RuleSet, answer: Answer) -> Standing:
    why = "; ".join(answer.why_not)
    if answer.holds is None:
        why = _needs(answer)
    elif answer.holds and not rules.table.limits:
        why = "holds no limits: " + "; ".join(rules.table.left_out)
    return Standing(rules.name, "", (), answer.holds, why)


def _undecided_set(rules: RuleSet, answer: Answer) -> Verdict:
    missing = tuple(sorted(answer.missing))
    return Verdict(
        point="all",
        rule=rules.name,
        row="",
        pollutant="",
        unit="",
        verdict="undecided",
        limit_status="",
        reason=f"whether the set binds needs {', '.join(missing)}",
        missing=missing,
    )


def _confirmed(case: Case, sets: Sequence[RuleSet]) -> frozenset[str]:
    """Return the rows the user has read in the official text; each must say where."""
    known = {rules.name: {row.row for row in rules.table.limits} for rules in sets}
    shipped = set(names())
    rows, problems = [], []
    for text in case.rules.confirmed:
        place, _, where = text.partition(":")
        rule, _, row = place.strip().partition("/")
        if not where.strip():
            problems.append(
                Problem(
                    "a confirmation that does not say where the row was read",
                    'write "SET/ROW: where it was read"',
                    "rules.confirmed",
                    text,
                )
            )
        elif rule in known and row not in known[rule]:
            problems.append(
                Problem(
                    "no such row",
                    f"`combustor rules {rule}` lists its rows",
                    "rules.confirmed",
                    text,
                )
            )
        elif rule not in known and rule not in shipped:
            problems.append(
                Problem(
                    "no such rule set",
                    f"known: {', '.join(sorted(set(known) | shipped))}",
                    "rules.confirmed",
                    text,
                )
            )
        rows.append(f"{rule}/{row}")
    if problems:
        raise InputError(problems)
    return frozenset(rows)


def _stack(case: Case, fuel: Fuel, rated: PointRating) -> Stack:
    assert rated.emissions is not None
    return stack_of(
        rated.emissions,
        fuel.lower_heating_value,
        fuel.higher_heating_value,
        output=case.point(rated.name).output,
        hours=case.rules.hours,
        fuel_sulfur=fuel_sulfur(case, fuel),
    )


def _subject(
    case: Case, fuel: Fuel, facts: Facts, rated: PointRating, stacks: Mapping[str, Stack]
) -> Subject:
    point = case.point(rated.name)
    return Subject(
        name=rated.name,
        stack=stacks.get(rated.name),
        facts=facts_at(facts, point),
        fuel=_limit_fuel(fuel),
        front_end=case.targets.front_end,
        ambient=_ambient(point),
        no_result=f"no result at this point: {rated.status.replace('_', ' ')}",
    )


def _limit_fuel(fuel: Fuel) -> FuelOfLimit:
    return FuelOfLimit(dict(fuel.atoms), fuel.lower_heating_value * fuel.molar_mass)


def _ambient(point: Point) -> AmbientAir | None:
    if point.ambient_temperature is None or point.ambient_pressure is None:
        return None
    return AmbientAir(point.ambient_temperature, point.ambient_pressure, point.humidity)


def _cycle(
    case: Case, fuel: Fuel, facts: Facts, ratings: Ratings, stacks: Mapping[str, Stack]
) -> Subject:
    """Return the landing and take-off cycle as one subject."""
    subject = Subject(
        CYCLE,
        None,
        facts,
        _limit_fuel(fuel),
        front_end=case.targets.front_end,
        cycle=True,
        no_result="needs points with cycle_mode " + ", ".join(TIME_IN_MODE),
    )
    modes = _modes(case, ratings)
    lacking = [mode for mode in TIME_IN_MODE if mode not in modes]
    if lacking:
        return replace(subject, no_result=f"needs a point with cycle_mode {', '.join(lacking)}")
    silent = [name for name in modes.values() if name not in stacks]
    if silent:
        return replace(subject, no_result=f"no result at point {', '.join(silent)}")
    thrust = facts.values.get("rated_thrust")
    stack = stacks[modes["take-off"]]
    if thrust is not None:
        totals = {}
        for pollutant in ("NOx", "CO", "UHC"):
            try:
                totals[pollutant] = _per_thrust(case, pollutant, modes, stacks, thrust)
            except FactMissing:
                continue
        stack = replace(stack, per_thrust=totals)
    return replace(subject, stack=stack)


def _per_thrust(
    case: Case, pollutant: str, modes: Mapping[str, str], stacks: Mapping[str, Stack], thrust: float
) -> float:
    found = {}
    for mode, name in modes.items():
        stack = stacks[name]
        index = stack.mass_flow(pollutant) / stack.fuel_flow
        if pollutant == "NOx":
            index *= aircraft_humidity_factor(case.point(name).humidity)
        found[mode] = Mode(index, stack.fuel_flow)
    return mass_per_thrust(found, thrust)


def _modes(case: Case, ratings: Ratings) -> dict[str, str]:
    """Return the point of each mode of the landing and take-off cycle."""
    rated = {point.name for point in ratings.points}
    modes: dict[str, str] = {}
    for point in case.points:
        if point.cycle_mode is None or point.name not in rated:
            continue
        mode = _MODES.get(point.cycle_mode.lower())
        if mode is None:
            continue
        if mode in modes:
            raise InputError(
                Problem(
                    f"two points are the {mode} of the cycle",
                    "one point a mode",
                    "points.cycle_mode",
                    f"{modes[mode]}, {point.name}",
                )
            )
        modes[mode] = point.name
    return modes


def _notes(case: Case, facts: Facts, fuel: Fuel, leaning: set[str]) -> tuple[str, ...]:
    found = [f"{name.replace('_', ' ')} taken as {told}" for name, told in facts.derived.items()]
    if leaning:
        names = ", ".join(sorted(leaning))
        found.append(f"limits were left out on what was taken so: state {names} in [rules]")
    heat = facts.derived.get("heat_input")
    if heat is None and facts.heat_input is not None and facts.heat_input_basis is None:
        found.append("heat input is stated without heat_input_basis, LHV or HHV")
    if fuel_sulfur(case, fuel) is None:
        found.append("sulfur of the fuel is not stated ([rules] fuel_sulfur): no SO2")
    return tuple(found)
