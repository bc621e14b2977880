"""What gave way: each target relaxed by a step, the machine sized again, and what that bought."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from combustor.base.errors import CombustorError
from combustor.case.schema import Case, Targets
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.sizing.record import Design
from combustor.sizing.size import size

FILM_WORTH = 0.002
LENGTH_WORTH = 0.01
JET_WORTH = 0.02


@dataclass(frozen=True)
class Trade:
    """One target relaxed by a step.

    Parameters
    ----------
    target : str
        As in the case file.
    step : str
        In words.
    verdict : {"binds", "buys", "no gain", "refused"}
        Relaxing it removes a broken limit; buys something; buys nothing; gives no metal.
    film_air : float
        Change of the film air's share [-]
    liner_length, casing_height : float
        Changes [m]
    momentum_ratio : float
        Of the dilution jets (of the last row), relative change [-]
    limits_met : int
        Broken limits fewer than before.
    note : str
    """

    target: str
    step: str
    verdict: str
    film_air: float = 0.0
    liner_length: float = 0.0
    casing_height: float = 0.0
    momentum_ratio: float = 0.0
    limits_met: int = 0
    note: str = ""


def trades_of(case: Case, fuel: Fuel, gas: Gas, design: Design) -> tuple[Trade, ...]:
    """Return what relaxing each target by a step would buy, each by sizing again.

    Parameters
    ----------
    case : Case
    fuel : Fuel
    gas : Gas
    design : Design
        Of the case as it stands.
    """
    return tuple(
        _trade(case, fuel, gas, design, target, step, relax) for target, step, relax in STEPS
    )


def _loss(targets: Targets) -> dict[str, object]:
    return {"pressure_loss": (targets.pressure_loss or 0.0) + 0.005}


def _wall(targets: Targets) -> dict[str, object]:
    return {"wall_temperature": targets.wall_temperature + 25.0}


def _pattern(targets: Targets) -> dict[str, object]:
    return {"pattern_factor": targets.pattern_factor + 0.02}


def _primary(targets: Targets) -> dict[str, object]:
    zones = targets.equivalence_ratio
    return {"equivalence_ratio": zones.model_copy(update={"primary": zones.primary + 0.05})}


STEPS: tuple[tuple[str, str, Callable[[Targets], dict[str, object]]], ...] = (
    ("pressure_loss", "+0.5 points", _loss),
    ("wall_temperature", "+25 K", _wall),
    ("pattern_factor", "+0.02", _pattern),
    ("equivalence_ratio.primary", "+0.05", _primary),
)


def _trade(
    case: Case,
    fuel: Fuel,
    gas: Gas,
    design: Design,
    target: str,
    step: str,
    relax: Callable[[Targets], dict[str, object]],
) -> Trade:
    targets = case.targets.model_copy(update=relax(case.targets))
    try:
        other = size(case.model_copy(update={"targets": targets}), fuel, gas)
    except CombustorError as refusal:
        return Trade(target, step, "refused", note=str(refusal))
    before, after = design.hardware, other.hardware
    film = _film(other) - _film(design)
    length = after.liner_length - before.liner_length
    casing = after.reference_height - before.reference_height
    jets = _momentum(other) / _momentum(design) - 1.0 if _momentum(design) > 0.0 else 0.0
    limits = _broken(design) - _broken(other)
    buys = (
        film < -FILM_WORTH
        or length < -LENGTH_WORTH * before.liner_length
        or casing < -LENGTH_WORTH * before.reference_height
        or jets > JET_WORTH
    )
    verdict = "binds" if limits > 0 else "buys" if buys else "no gain"
    return Trade(target, step, verdict, film, length, casing, jets, limits)


def _film(design: Design) -> float:
    return design.split.flow("film") / design.split.flow()


def _broken(design: Design) -> int:
    return sum(finding.level == "act" for finding in design.findings)


def _momentum(design: Design) -> float:
    jets = [f for f in design.split.openings if f.role in ("primary", "secondary", "dilution")]
    return jets[-1].momentum_flux_ratio if jets else 0.0
