"""A row's limit for one machine, rounding as the rule words it, and the verdict."""

from __future__ import annotations

from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Decimal
from math import floor, log10
from typing import Literal

from combustor.emissions.band import Band
from combustor.emissions.facts import Facts
from combustor.emissions.hydrogen_reading import hydrogen_limit_factor
from combustor.emissions.rule_schema import NitrogenAllowance, Rounding, Row, Terms
from combustor.emissions.stack import FactMissing

Word = Literal["inside", "too close to call", "outside", "undecided", "limit not verified"]


@dataclass(frozen=True)
class FuelOfLimit:
    """What of the fuel moves a limit: atoms per molecule and J/mol (lower)."""

    atoms: dict[str, float]
    molar_heat: float


def limit_of(
    row: Row,
    facts: Facts,
    fuel: FuelOfLimit,
    partner: Row | None = None,
    natural_gas_share: float | None = None,
) -> float:
    """Return a row's limit in its unit, for this machine and fuel.

    Parameters
    ----------
    row : Row
    facts : Facts
    fuel : FuelOfLimit
    partner : Row, optional
        Whose limit is weighed in by heat.
    natural_gas_share : float, optional
        Of the heat, the weight of ``row``.

    Raises
    ------
    FactMissing
        The limit depends on a fact that is not known.
    """
    limit = row.limit if row.terms is None else _of_terms(row.terms, facts)
    assert limit is not None
    if row.scale is not None:
        factor = _fact(facts, "efficiency", "the limit rises with efficiency") / row.scale.reference
        limit *= max(factor, 1.0) if row.scale.never_below else factor
        limit = limit if row.scale.cap is None else min(limit, row.scale.cap)
    if row.nitrogen:
        nitrogen = _fact(facts, "fuel_nitrogen", "the limit allows for nitrogen bound in the fuel")
        limit += _allowance(row.nitrogen, 100.0 * nitrogen)
    if row.hydrogen_factor is not None:
        limit *= hydrogen_limit_factor(fuel.atoms, fuel.molar_heat, row.hydrogen_factor)
    if partner is not None and natural_gas_share is not None:
        other = limit_of(partner, facts, fuel)
        limit = natural_gas_share * limit + (1.0 - natural_gas_share) * other
    return limit


def _of_terms(terms: Terms, facts: Facts) -> float:
    ratio = _fact(facts, "pressure_ratio", "the limit follows from overall pressure ratio")
    limit = terms.constant + terms.pressure_ratio * ratio
    if terms.thrust or terms.product:
        thrust = 1e-3 * _fact(facts, "rated_thrust", "the limit follows from rated thrust")
        limit += (terms.thrust + terms.product * ratio) * thrust
    return limit


def _allowance(steps: tuple[NitrogenAllowance, ...], percent: float) -> float:
    for step in steps:
        if step.up_to is None or percent <= step.up_to:
            return step.constant + step.slope * (percent - step.offset)
    return 0.0


def _fact(facts: Facts, name: str, why: str) -> float:
    if name not in facts.values:
        raise FactMissing(name, why)
    return float(facts.values[name])


def rounded(value: float, rounding: Rounding | None) -> float:
    """Return a value as the rule rounds it, half to even; unchanged where it says nothing."""
    if rounding is None or value == 0.0:
        return value
    decimals = rounding.decimals
    if rounding.figures is not None:
        decimals = rounding.figures - 1 - floor(log10(abs(value)))
        if rounding.decimals_above is not None and value >= rounding.decimals_above:
            decimals = 1
    if decimals is None:
        return value
    step = Decimal(1).scaleb(-decimals)
    return float(Decimal(repr(value)).quantize(step, ROUND_HALF_EVEN))


def judged(band: Band, limit: float, rounding: Rounding | None) -> Word:
    """Return what a value and its band are against a limit.

    Outside when even the band's low end breaks it; inside when the high end and the rounded
    value keep it; else too close to call.
    """
    if band.low > limit:
        return "outside"
    if band.high <= limit and rounded(band.value, rounding) <= limit:
        return "inside"
    return "too close to call"
