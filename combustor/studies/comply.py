"""Compliance pre-check: rated emissions against every limit that binds, with margins."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from datetime import date
from pathlib import Path

from combustor.base.errors import InputError, Problem
from combustor.case.schema import Case, Point
from combustor.emissions.applicability import Binding, rows_binding, set_binds
from combustor.emissions.facts import Answer, Facts
from combustor.emissions.hydrogen_reading import apparent_factor
from combustor.emissions.limit import FuelOfLimit
from combustor.emissions.reference_day import AmbientAir
from combustor.emissions.rule_set import RuleSet, find_rules, names
from combustor.emissions.stack import Stack, stack_of
from combustor.emissions.verdict import Subject, Verdict, verdict_on
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.rating.rate import rate_case
from combustor.rating.record import PointRating, Ratings
from combustor.studies.close_gap import gaps_of
from combustor.studies.comply_record import ComplyCheck, Standing
from combustor.studies.landing_cycle import CYCLE, cycle_of
from combustor.studies.machine_facts import facts_at, facts_of, fuel_sulfur


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
    cycle = cycle_of(case, _limit_fuel(fuel), facts, found, stacks)
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
        judged = [*subjects, cycle] if by_cycle else subjects
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
            if (binding.row.emission_unit.kind == "thrust") != (subject.name == CYCLE):
                continue
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


def _notes(case: Case, facts: Facts, fuel: Fuel, leaning: set[str]) -> tuple[str, ...]:
    found = [f"{name.replace('_', ' ')} taken as {told}" for name, told in facts.derived.items()]
    if leaning:
        names = ", ".join(sorted(leaning))
        found.append(f"limits were left out on what was taken so: state {names} in [rules]")
    hydrogen = facts.values.get("hydrogen_share", 0.0)
    if hydrogen > 0.0:
        factor = apparent_factor(fuel.atoms, fuel.lower_heating_value * fuel.molar_mass)
        found.append(
            f"with {100 * hydrogen:.4g} % hydrogen by volume every concentration at a reference "
            f"O2 reads {factor:.3f} times what methane would at the same mass per heat (LHV)"
        )
    heat = facts.derived.get("heat_input")
    if heat is None and facts.heat_input is not None and facts.heat_input_basis is None:
        found.append("heat input is stated without heat_input_basis, LHV or HHV")
    if fuel_sulfur(case, fuel) is None:
        found.append("sulfur of the fuel is not stated ([rules] fuel_sulfur): no SO2")
    return tuple(found)
