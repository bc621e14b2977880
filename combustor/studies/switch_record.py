"""What a fuel switch study brings back."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from combustor.rating.record import PointRating
from combustor.studies.switch_fuels import Properties

Hold = Literal["exit-temperature", "heat", "valve"]
Verdict = Literal["as it is", "with changes", "not on this metal", "cannot say"]
HOLDS: tuple[Hold, ...] = ("exit-temperature", "heat", "valve")


@dataclass(frozen=True)
class InjectorUse:
    """The injector at one point on one fuel.

    Parameters
    ----------
    point, fuel : str
    volume_flow : float
        Gas at 15 degC and 101.325 kPa, liquid at 15 degC [m3/s]
    pressure_ratio : float or None
        Ahead of the injector over the liner, same injector; None where one of the fuels is a
        liquid or the injector cannot pass the fuel [-]
    choked : bool or None
    area_ratio : float or None
        Effective area over the present one for the pressure ratio of the case's own fuel [-]
    """

    point: str
    fuel: str
    volume_flow: float
    pressure_ratio: float | None
    choked: bool | None
    area_ratio: float | None


@dataclass(frozen=True)
class Limit:
    """One limit a fuel was held against at one point.

    Parameters
    ----------
    what, point, unit : str
    value, limit : float or None
    kept : bool
    known : bool
        False where the physics to judge it is missing.
    by_change : bool
        A change of metal or setting, named among the changes, can bring it back.
    """

    what: str
    point: str
    value: float | None
    limit: float | None
    unit: str
    kept: bool
    known: bool = True
    by_change: bool = False


@dataclass(frozen=True)
class Change:
    """One change that a fuel asks for: what, by how much, and what to mind."""

    what: str
    amount: str
    note: str


@dataclass(frozen=True)
class Switched:
    """One fuel on the metal.

    Parameters
    ----------
    properties : Properties
    points : tuple of PointRating
        In the order of the case.
    injector : tuple of InjectorUse
    limits : tuple of Limit
        Broken, unknown or near; kept ones of note.
    changes : tuple of Change
    verdict : Verdict
    reasons : tuple of str
    own_mechanism_nox : float or None
        NOx at the design point by the mechanism this fuel would be given alone, mole fraction
        dry at 15 % O2; None where it is the same.
    own_mechanism : str
    """

    properties: Properties
    points: tuple[PointRating, ...]
    injector: tuple[InjectorUse, ...]
    limits: tuple[Limit, ...]
    changes: tuple[Change, ...]
    verdict: Verdict
    reasons: tuple[str, ...]
    own_mechanism_nox: float | None = None
    own_mechanism: str = ""

    @property
    def broken(self) -> tuple[Limit, ...]:
        """The limits it does not keep."""
        return tuple(limit for limit in self.limits if not limit.kept)


@dataclass(frozen=True)
class Rung:
    """What the ladder found: the largest share that keeps every limit, and what stops it.

    ``share`` is None where not even the first rung keeps them. ``with_nozzle`` is the same with
    an injector of its own for each fuel.
    """

    added: str
    share: float | None
    stopped_by: Limit | None
    with_nozzle: float | None
    then_stopped_by: Limit | None


@dataclass(frozen=True)
class Switch:
    """A fuel switch study.

    Parameters
    ----------
    title, case_sha256 : str
    hold : Hold
    mechanism_note : str
        Of the one mechanism all were burnt with.
    injector_ratio : float
        Pressure ratio of the injector at the design point on the case's own fuel [-]
    injector_ratio_source : str
    baseline : Switched
    fuels : tuple of Switched
    refused : tuple of (str, str)
        Fuels no common mechanism burns, and why.
    ladder : Rung or None
    sized : bool
        The case had no metal and was sized first.
    """

    title: str
    case_sha256: str
    hold: Hold
    mechanism_note: str
    injector_ratio: float
    injector_ratio_source: str
    baseline: Switched
    fuels: tuple[Switched, ...]
    refused: tuple[tuple[str, str], ...]
    ladder: Rung | None = None
    sized: bool = False
