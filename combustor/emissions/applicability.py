"""Which rule sets and which of their rows bind a machine at an operating point, and why."""

from __future__ import annotations

from dataclasses import dataclass

from combustor.emissions.facts import Answer, Facts, any_of, every, negated, some
from combustor.emissions.rule_schema import Exemption, Row
from combustor.emissions.rule_set import RuleSet

FULLY = 0.98


@dataclass(frozen=True)
class Binding:
    """A row and whether it binds.

    Parameters
    ----------
    row : Row
    answer : Answer
    natural_gas_share : float or None
        Where the limit is prorated by heat with that of the row's partner.
    exempt : str
        The exemption that leaves it out; empty where there is none.
    """

    row: Row
    answer: Answer
    natural_gas_share: float | None = None
    exempt: str = ""


def set_binds(rules: RuleSet, facts: Facts) -> Answer:
    """Return whether a set applies to a machine at all, load aside."""
    table = rules.table
    answers = [any_of(table.applies, facts, table.heating_value)]
    country = facts.values.get("country")
    if table.countries and country is not None:
        inside = country in table.countries
        why = f"the machine stands in {country}"
        answers.insert(0, Answer(inside, frozenset(), frozenset(), () if inside else (why,)))
    return every(answers)


def rows_binding(rules: RuleSet, facts: Facts) -> tuple[Binding, ...]:
    """Return every row of a set with whether it binds, at one operating point's facts."""
    return tuple(_binding(rules, row, facts) for row in rules.table.limits)


def _binding(rules: RuleSet, row: Row, facts: Facts) -> Binding:
    table = rules.table
    heat = table.heating_value
    share, seen = _mixed(rules, row, facts)
    answers = [any_of(row.when, seen, heat)]
    if row.given is not None:
        named = table.conditions[row.given]
        answers.append(any_of(named, seen, heat))
    if row.unless is not None:
        named = table.conditions[row.unless]
        answers.append(negated(any_of(named, seen, heat), f"the {row.unless} rows rule instead"))
    exempt = next((e.what for e in table.exemptions if _exempts(e, row, seen, rules)), "")
    if exempt:
        return Binding(row, Answer(False, why_not=(exempt,)), None, exempt)
    return Binding(row, every(answers), share)


def _exempts(exemption: Exemption, row: Row, facts: Facts, rules: RuleSet) -> bool:
    # an exemption counts only where it is known to hold
    if exemption.pollutants and row.pollutant not in exemption.pollutants:
        return False
    heat = rules.table.heating_value
    return some([any_of(exemption.when, facts, heat)]).holds is True


def _mixed(rules: RuleSet, row: Row, facts: Facts) -> tuple[float | None, Facts]:
    """Return the share by which a limit is prorated, and the facts as the rule words them."""
    least = rules.table.mixed_fuel_share
    share = facts.natural_gas_share
    if least is None or share >= FULLY or share <= least:
        return None, facts
    seen = facts.at(fuel="natural-gas")
    return (share if row.prorate_with is not None else None), seen
