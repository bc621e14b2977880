"""What is known of a machine, and whether a condition of a rule holds: yes, no, cannot tell."""

from __future__ import annotations

import datetime
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass, field, replace
from typing import Any, Literal

from combustor.emissions.rule_schema import Range, When

Heat = Literal["LHV", "HHV"]


@dataclass(frozen=True)
class Facts:
    """What is known; a fact that is not there is not known.

    Parameters
    ----------
    values : mapping of str to value
        By the names of ``When``; SI, load in percent; ``heat_input`` apart.
    heat_input : float or None
        W.
    heat_input_basis : {"LHV", "HHV"} or None
        None where the user did not say.
    higher_over_lower : float
        Heating values of the fuel.
    derived : mapping of str to str
        Facts the user did not state, with what they were taken from.
    natural_gas_share : float
        Of the fuel's heat.
    """

    values: Mapping[str, Any] = field(default_factory=dict)
    heat_input: float | None = None
    heat_input_basis: Heat | None = None
    higher_over_lower: float = 1.1
    derived: Mapping[str, str] = field(default_factory=dict)
    natural_gas_share: float = 0.0

    def at(self, **point: Any) -> Facts:
        """Return the facts with those of an operating point; None is not known."""
        known = {name: value for name, value in point.items() if value is not None}
        return replace(self, values={**self.values, **known})

    def heat_inputs(self, heat: Heat) -> tuple[float, ...]:
        """Return what the heat input may be on a heating value: one, two, or nothing known."""
        if self.heat_input is None:
            return ()
        bases = (self.heat_input_basis,) if self.heat_input_basis else ("LHV", "HHV")
        scale = {"LHV": 1.0, "HHV": self.higher_over_lower}
        return tuple(self.heat_input * scale[heat] / scale[basis] for basis in bases)


@dataclass(frozen=True)
class Answer:
    """Whether something holds.

    Parameters
    ----------
    holds : bool or None
        None where facts are missing.
    missing : frozenset of str
        Facts without which it cannot be told.
    used : frozenset of str
        Facts it rests on.
    why_not : tuple of str
        What does not hold.
    """

    holds: bool | None
    missing: frozenset[str] = frozenset()
    used: frozenset[str] = frozenset()
    why_not: tuple[str, ...] = ()


YES = Answer(True)


def every(answers: Iterable[Answer]) -> Answer:
    """Return whether all hold: one no decides, else one that cannot be told."""
    answers = tuple(answers)
    for answer in answers:
        if answer.holds is False:
            return answer
    used = frozenset[str]().union(*(answer.used for answer in answers))
    missing = frozenset[str]().union(*(a.missing for a in answers if a.holds is None))
    return Answer(None if missing else True, missing, used)


def some(answers: Iterable[Answer]) -> Answer:
    """Return whether one holds: one yes decides, else one that cannot be told."""
    answers = tuple(answers)
    for answer in answers:
        if answer.holds is True:
            return answer
    used = frozenset[str]().union(*(answer.used for answer in answers))
    missing = frozenset[str]().union(*(a.missing for a in answers if a.holds is None))
    why = tuple(dict.fromkeys(reason for a in answers for reason in a.why_not))
    return Answer(None if missing else False, missing, used, () if missing else why)


def negated(answer: Answer, why: str) -> Answer:
    """Return whether it does not hold; ``why`` is said where it does."""
    if answer.holds is None:
        return answer
    return Answer(not answer.holds, used=answer.used, why_not=(why,) if answer.holds else ())


def any_of(alternatives: Iterable[When], facts: Facts, heat: Heat) -> Answer:
    """Return whether one of the alternatives holds; none stated holds always."""
    alternatives = tuple(alternatives)
    return some(holds(when, facts, heat) for when in alternatives) if alternatives else YES


def holds(when: When, facts: Facts, heat: Heat) -> Answer:
    """Return whether everything a condition names holds."""
    answers = []
    for name in type(when).model_fields:
        wanted = getattr(when, name)
        if wanted is None:
            continue
        if name == "heat_input":
            answers.append(_heat_input(wanted, facts, heat))
        elif name not in facts.values:
            answers.append(Answer(None, frozenset({name})))
        elif isinstance(wanted, Range):
            answers.append(_within(name, wanted, facts.values[name]))
        else:
            answers.append(_among(name, wanted, facts.values[name]))
    return every(answers)


def _among(name: str, wanted: tuple[str, ...], value: str) -> Answer:
    used = frozenset({name})
    if value in wanted:
        return Answer(True, used=used)
    return Answer(
        False,
        used=used,
        why_not=(f"{name.replace('_', ' ')} is {value}, not {' or '.join(wanted)}",),
    )


def _heat_input(wanted: Range[Any], facts: Facts, heat: Heat) -> Answer:
    candidates = facts.heat_inputs(heat)
    if not candidates:
        return Answer(None, frozenset({"heat_input"}))
    answers = [_within("heat_input", wanted, value, f" {heat}") for value in candidates]
    if len({answer.holds for answer in answers}) > 1:
        return Answer(None, frozenset({"heat_input_basis"}))
    return answers[0]


def _within(name: str, wanted: Range[Any], value: Any, tail: str = "") -> Answer:
    used = frozenset({name})
    tests: tuple[tuple[str, Any, Callable[[Any], bool]], ...] = (
        ("above", wanted.above, lambda bound: value > bound),
        ("at least", wanted.at_least, lambda bound: value >= bound),
        ("below", wanted.below, lambda bound: value < bound),
        ("up to", wanted.up_to, lambda bound: value <= bound),
    )
    for words, bound, test in tests:
        if bound is not None and not test(bound):
            shown = f"{name.replace('_', ' ')} {shown_value(name, value)}{tail} is not {words} "
            return Answer(False, used=used, why_not=(shown + shown_value(name, bound),))
    return Answer(True, used=used)


_SHOWN: Mapping[str, tuple[float, str]] = {
    "heat_input": (1e-6, "MW"),
    "rated_output": (1e-6, "MW"),
    "load": (1.0, "%"),
    "ambient_temperature": (1.0, "K"),
    "hours": (1.0, "h"),
    "capacity_factor": (100.0, "%"),
    "efficiency": (100.0, "%"),
    "total_efficiency": (100.0, "%"),
    "rated_thrust": (1e-3, "kN"),
    "pressure_ratio": (1.0, ""),
    "hydrogen_share": (100.0, "%"),
}


def shown_value(name: str, value: Any) -> str:
    """Return a fact as a person reads it."""
    if isinstance(value, datetime.date):
        return value.isoformat()
    if name in _SHOWN and isinstance(value, int | float):
        scale, unit = _SHOWN[name]
        return f"{value * scale:.4g} {unit}".rstrip()
    return str(value)
