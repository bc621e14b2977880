"""The verdict on one row at one operating point, with everything it rests on."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

from combustor.emissions.applicability import Binding
from combustor.emissions.band import band_of
from combustor.emissions.bases import OXYGEN_IN_AIR
from combustor.emissions.emission_unit import EmissionUnit
from combustor.emissions.facts import Facts
from combustor.emissions.landing_takeoff import characteristic_factor
from combustor.emissions.limit import FuelOfLimit, Word, judged, limit_of, rounded
from combustor.emissions.pollutant import POLLUTANTS
from combustor.emissions.reference_day import REFERENCE_PRESSURE, AmbientAir, iso_factor
from combustor.emissions.rule_schema import UNVERIFIED, Row
from combustor.emissions.rule_set import RuleSet
from combustor.emissions.stack import FactMissing, Stack

STATUS = {
    "official text": "read in the official text",
    "own permit": "stated in the user's own file",
    "copy": "read in a copy",
    "older edition": "of an older edition",
    "from memory": "from memory",
    "derived": "derived",
}
CONFIRMED = "confirmed by the user"


@dataclass(frozen=True)
class Verdict:
    """One row at one operating point.

    Parameters
    ----------
    point, rule, row, pollutant : str
    predicted, predicted_rounded, band_low, band_high, limit : float or None
        In ``unit``; None where it cannot be expressed.
    unit : str
    margin : float or None
        Limit less predicted, unrounded.
    margin_percent : float or None
        Of the limit.
    probability_of_exceeding : float or None
    verdict : str
    limit_status : str
        Where the limit was read.
    reason : str
    choice : str
        Rows of one choice at one point are options of which one need be kept.
    would_be : str
        The verdict if nothing stood in its way; empty where it is the verdict.
    missing : tuple of str
        Facts that are missing.
    averaging, beside : str
        Averaging time; the same emission on other bases.
    """

    point: str
    rule: str
    row: str
    pollutant: str
    unit: str
    verdict: Word
    limit_status: str
    reason: str = ""
    predicted: float | None = None
    predicted_rounded: float | None = None
    band_low: float | None = None
    band_high: float | None = None
    limit: float | None = None
    margin: float | None = None
    margin_percent: float | None = None
    probability_of_exceeding: float | None = None
    choice: str = ""
    would_be: str = ""
    missing: tuple[str, ...] = ()
    averaging: str = ""
    beside: str = ""


@dataclass(frozen=True)
class Subject:
    """What is judged: one exhaust with the facts that go with it.

    Parameters
    ----------
    name : str
        Of the operating point, or of the cycle.
    stack : Stack or None
        None where the point has no result; ``no_result`` says why.
    facts : Facts
        With those of the point.
    fuel : FuelOfLimit
    front_end : str
    ambient : AmbientAir or None
        None where ambient temperature or pressure is not stated.
    no_result : str
    """

    name: str
    stack: Stack | None
    facts: Facts
    fuel: FuelOfLimit
    front_end: str = "diffusion"
    ambient: AmbientAir | None = None
    no_result: str = ""


def verdict_on(
    rules: RuleSet,
    binding: Binding,
    subject: Subject,
    confirmed: frozenset[str] = frozenset(),
    scatter: Mapping[str, float] | None = None,
    set_missing: frozenset[str] = frozenset(),
    set_used: frozenset[str] = frozenset(),
) -> Verdict:
    """Return the verdict on a row that binds or may bind.

    Parameters
    ----------
    rules : RuleSet
    binding : Binding
        Holds, or cannot be told.
    subject : Subject
    confirmed : frozenset of str
        "SET/ROW" the user has read in the official text.
    scatter : mapping of str to float, optional
        The user's own, by pollutant.
    set_missing, set_used : frozenset of str
        Facts that the applicability of the whole set lacks and rests on.
    """
    row = binding.row
    is_confirmed = f"{rules.name}/{row.row}" in confirmed
    start = Verdict(
        point=subject.name,
        rule=rules.name,
        row=row.row,
        pollutant=row.pollutant,
        unit=row.emission_unit.text,
        verdict="undecided",
        limit_status=CONFIRMED if is_confirmed else STATUS[row.reading],
        choice=f"{rules.name}/{row.choice}" if row.choice else "",
        averaging=row.averaging or "",
    )
    missing = set(binding.answer.missing | set_missing)
    judged_row, more = _valued(start, rules, binding, subject, scatter)
    missing |= more
    if judged_row.would_be == "" or subject.stack is None:
        return replace(judged_row, missing=tuple(sorted(missing)))
    would_be = judged_row.would_be
    if missing:
        reason = f"needs {_listed(missing)}; would be {would_be} if this row binds"
        return replace(judged_row, reason=reason, missing=tuple(sorted(missing)))
    if row.reading in UNVERIFIED and not is_confirmed:
        reason = (
            f"would be {would_be}; the figure is {STATUS[row.reading]}: read the official text, "
            f'then [rules] confirmed = ["{rules.name}/{row.row}: where"]'
        )
        return replace(judged_row, verdict="limit not verified", reason=reason)
    rests_on = binding.answer.used | set_used | _limit_facts(row)
    taken = rests_on & subject.facts.derived.keys()
    if would_be == "inside" and taken:
        told = "; ".join(f"{name}: {subject.facts.derived[name]}" for name in sorted(taken))
        reason = f"would be inside; state {_listed(taken)} in [rules], which was taken as {told}"
        return replace(judged_row, reason=reason, missing=tuple(sorted(taken)))
    return replace(judged_row, verdict=_word(would_be), would_be="", reason=judged_row.reason)


def _valued(
    start: Verdict,
    rules: RuleSet,
    binding: Binding,
    subject: Subject,
    scatter: Mapping[str, float] | None,
) -> tuple[Verdict, set[str]]:
    """Return the verdict with its numbers and what it would be, and the facts still missing."""
    row = binding.row
    if subject.stack is None:
        return replace(start, reason=subject.no_result), set()
    if row.pollutant not in POLLUTANTS:
        return replace(start, reason=f"{row.pollutant} is not predicted by this tool"), set()
    missing: set[str] = set()
    reasons: list[str] = []
    limit = value = None
    try:
        partner = rules.row(row.prorate_with) if row.prorate_with is not None else None
        limit = limit_of(row, subject.facts, subject.fuel, partner, binding.natural_gas_share)
        if binding.natural_gas_share is not None:
            share = 100.0 * binding.natural_gas_share
            reasons.append(f"limit prorated: {share:.1f} % of the heat is natural gas")
    except FactMissing as lack:
        missing.add(lack.fact)
        reasons.append(lack.why)
    try:
        value = _predicted(rules, row, subject)
    except FactMissing as lack:
        missing.add(lack.fact)
        reasons.append(lack.why)
    start = replace(start, limit=limit)
    if value is None:
        return replace(start, reason=_needs(reasons, missing)), missing
    band = band_of(value, row.pollutant, scatter)
    start = replace(
        start,
        predicted=band.value,
        predicted_rounded=rounded(band.value, row.rounding),
        band_low=band.low,
        band_high=band.high,
        beside=_beside(row, subject),
    )
    if limit is None:
        return replace(start, reason=_needs(reasons, missing)), missing
    return replace(
        start,
        margin=limit - value,
        margin_percent=100.0 * (limit - value) / limit,
        probability_of_exceeding=band.probability_above(limit),
        would_be=judged(band, limit, row.rounding),
        reason="; ".join(reasons),
    ), missing


def _predicted(rules: RuleSet, row: Row, subject: Subject) -> float:
    assert subject.stack is not None
    table = rules.table
    unit = row.emission_unit
    if unit.kind == "heat" and unit.heat is None:
        unit = replace(unit, heat=table.heating_value)
    value = subject.stack.express(
        row.pollutant, unit, table.reference_oxygen, table.oxygen_in_air, row.counted_as
    )
    if row.ambient_correction is not None:
        value *= _ambient(subject)
    if row.characteristic:
        if "engines_tested" not in subject.facts.values:
            raise FactMissing("engines_tested", "the level hangs on the number of engines tested")
        value /= characteristic_factor(row.pollutant, subject.facts.values["engines_tested"])
    return value


def _limit_facts(row: Row) -> frozenset[str]:
    """Return the facts that a row's limit is worked out from."""
    found = {"efficiency"} if row.scale is not None else set()
    if row.terms is not None:
        found |= {"pressure_ratio", "rated_thrust"}
    return frozenset(found | ({"fuel_nitrogen"} if row.nitrogen else set()))


def _ambient(subject: Subject) -> float:
    if subject.front_end != "diffusion":
        raise FactMissing(
            "a diffusion flame",
            "the rule's ISO-day correction holds for diffusion flames, not for a "
            f"{subject.front_end} front end",
        )
    if subject.ambient is None:
        raise FactMissing(
            "ambient_temperature and ambient_pressure",
            "the rule compares NOx corrected to the ISO day",
        )
    air = subject.ambient
    # inlet pressure goes with ambient pressure at the same corrected speed
    ratio = REFERENCE_PRESSURE / air.pressure
    return iso_factor(air.humidity, air.temperature, ratio, subject.front_end)


def _beside(row: Row, subject: Subject) -> str:
    """Return the same emission per heat where a hydrogen blend meets a concentration limit."""
    stack, unit = subject.stack, row.emission_unit
    share = subject.facts.values.get("hydrogen_share", 0.0)
    if stack is None or not unit.concentration or share <= 0.0 or row.pollutant == "CO2":
        return ""
    from combustor.emissions.hydrogen_reading import apparent_factor

    factor = apparent_factor(subject.fuel.atoms, subject.fuel.molar_heat)
    per_heat = EmissionUnit("g/MJ LHV", "heat", 1e-9, heat="LHV")
    value = stack.express(row.pollutant, per_heat, None, OXYGEN_IN_AIR)
    return (
        f"{100 * share:.4g} % hydrogen by volume reads {factor:.3f} times what methane would at "
        f"the same mass per heat; {value:.3g} g/MJ LHV"
    )


def _needs(reasons: list[str], missing: set[str]) -> str:
    return f"{'; '.join(reasons)}: needs {_listed(missing)}"


def _listed(names: set[str] | frozenset[str]) -> str:
    return ", ".join(sorted(names))


def _word(text: str) -> Word:
    words: tuple[Word, ...] = ("inside", "too close to call", "outside")
    return next(word for word in words if word == text)
