"""What a compliance pre-check found."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from combustor.emissions.facts import Facts
from combustor.emissions.rule_set import RuleSet
from combustor.emissions.stack import Stack
from combustor.emissions.verdict import Verdict
from combustor.fuel.record import Fuel
from combustor.rating.record import Ratings
from combustor.studies.close_gap import Gap


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
