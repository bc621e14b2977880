"""The public calls that take a case or a name and find fuel and mechanism themselves."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from combustor.case.schema import Case
    from combustor.fuel.record import Fuel
    from combustor.report.frame import RatedCase
    from combustor.sizing.record import Design
    from combustor.studies.comply_record import ComplyCheck
    from combustor.studies.flame import Flame
    from combustor.studies.switch_record import Switch


def find_fuel(name: str, mechanism: str | None = None) -> Fuel:
    """Return a fuel by catalogue name or blend, e.g. ``"natural-gas+30%hydrogen"``."""
    from combustor.fuel import catalogue

    return catalogue.find(name, mechanism)


def size(case: Case) -> Design:
    """Size the metal of a case.

    Raises
    ------
    InfeasibleError
        When no metal meets the targets; carries the chain of causes.
    """
    from combustor.fuel.gas import Gas
    from combustor.fuel.of_case import fuel_of
    from combustor.sizing.size import size as size_case

    fuel = fuel_of(case)
    return size_case(case, fuel, Gas.load(fuel.mechanism))


def rate(
    case: Case,
    fuel: str | None = None,
    points: Sequence[str] | None = None,
    mechanism: str | None = None,
) -> RatedCase:
    """Rate the metal of a case; a case without metal is sized first.

    Parameters
    ----------
    case : Case
    fuel : str, optional
        Catalogue name or blend to burn in place of the case's own fuel.
    points : sequence of str, optional
        Names of the operating points wanted; all when left out.
    mechanism : str, optional
        Cantera file in place of the tool's choice.

    Returns
    -------
    RatedCase
        One rating per operating point, in the case's order; ``frame()`` is a DataFrame.
    """
    from combustor.rating.rate import rate_case
    from combustor.report.frame import RatedCase

    return RatedCase.of(rate_case(case, fuel_name=fuel, points=points, mechanism=mechanism))


def switch_fuel(case: Case, fuels: Sequence[str], **options: Any) -> Switch:
    """Rate the metal of a case on other fuels, each with a verdict.

    Takes the options of :func:`combustor.studies.switch.switch_fuel`: ``hold``, ``ladder``,
    ``injector_ratio``.
    """
    from combustor.studies.switch import switch_fuel as switch_case

    return switch_case(case, fuels, **options)


def comply(
    case: Case, rules: Sequence[str] | None = None, points: Sequence[str] | None = None
) -> ComplyCheck:
    """Hold the emissions of a case against rule sets: a pre-check with margins.

    Parameters
    ----------
    case : Case
        Its ``[rules]`` give the facts the rules ask for.
    rules : sequence of str, optional
        Names of shipped sets, or paths of rule files; those of the case when left out.
    points : sequence of str, optional
        Names of the operating points wanted; all when left out.
    """
    from combustor.studies.comply import comply as comply_case

    return comply_case(case, rules=rules, points=points)


def flame(fuel: str | Fuel, **conditions: Any) -> Flame:
    """Look at one flame: equilibrium, and a stirred reactor where a time is given.

    Takes the conditions of :func:`combustor.studies.flame.flame`, SI.
    """
    from combustor.fuel.gas import Gas
    from combustor.studies.flame import flame as look

    burnt = find_fuel(fuel) if isinstance(fuel, str) else fuel
    return look(burnt, Gas.load(burnt.mechanism), **conditions)
