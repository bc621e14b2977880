"""NOx limits of aircraft engines by tier, and the strictest tier an engine's level keeps."""

from __future__ import annotations

from collections.abc import Mapping

from combustor.emissions.facts import Facts, any_of
from combustor.emissions.limit import FuelOfLimit, limit_of
from combustor.emissions.rule_set import shipped

RULES = "icao-annex-16"
TIERS = ("caep1", "caep2", "caep4", "caep6", "caep8")
_NO_FUEL = FuelOfLimit({}, 1.0)


def nox_limits(pressure_ratio: float, rated_thrust: float) -> Mapping[str, float]:
    """Return the NOx limit of every tier, kg/N, whatever the date of the engine.

    Parameters
    ----------
    pressure_ratio : float
        Overall, at take-off.
    rated_thrust : float
        N, above 26.7 kN.
    """
    facts = Facts({"pressure_ratio": pressure_ratio, "rated_thrust": rated_thrust})
    found = {}
    for row in shipped(RULES).table.limits:
        tier, _, rest = row.row.partition("-")
        if tier not in TIERS or not rest.startswith("nox"):
            continue
        undated = [when.model_copy(update={"type_date": None}) for when in row.when]
        if any_of(undated, facts, "LHV").holds:
            found[tier] = limit_of(row, facts, _NO_FUEL) * row.emission_unit.factor
    return found


def strictest_tier(level: float, pressure_ratio: float, rated_thrust: float) -> str | None:
    """Return the strictest tier whose NOx limit a level (kg/N) keeps; None where none."""
    limits = nox_limits(pressure_ratio, rated_thrust)
    kept = [tier for tier in TIERS if level <= limits[tier]]
    return kept[-1] if kept else None
