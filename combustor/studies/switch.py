"""Same metal, other fuels: every operating point again, side by side, with a verdict."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace
from functools import partial

from combustor.airflow.result import Inlet
from combustor.base.convergence import Convergence
from combustor.base.errors import CombustorError, InfeasibleError, InputError, Problem
from combustor.case.schema import Case, Point
from combustor.fuel import catalogue
from combustor.fuel.gas import Gas
from combustor.fuel.of_case import fuel_of
from combustor.fuel.record import Fuel
from combustor.hardware.from_case import hardware_of
from combustor.hardware.metal import Hardware
from combustor.rating.couple import Coupled
from combustor.rating.operability import NOTHING
from combustor.rating.operating import operating_of
from combustor.rating.rate import rate_near, rate_point
from combustor.rating.record import InletRecord, PointRating
from combustor.rating.settings import settings_of
from combustor.sizing.size import size
from combustor.studies.switch_changes import changes_of
from combustor.studies.switch_fuels import (
    Comparison,
    Ladder,
    check_names,
    compared,
    properties_of,
    rungs_of,
)
from combustor.studies.switch_injector import (
    DEFAULT_PRESSURE_RATIO,
    DEFAULT_RATIO,
    Nozzle,
    nozzle_of,
    use_of,
    valve_flow,
)
from combustor.studies.switch_reasons import reasons_of
from combustor.studies.switch_record import HOLDS, Hold, InjectorUse, Limit, Rung, Switch, Switched
from combustor.studies.switch_verdict import NOZZLE, limits_of, verdict_of

Report = Callable[[int, int], None]


def switch_fuel(
    case: Case,
    fuels: Sequence[str] = (),
    hold: Hold = "exit-temperature",
    ladder: Ladder | None = None,
    injector_ratio: float | None = None,
    report: Report | None = None,
) -> Switch:
    """Rate the metal of a case on other fuels.

    Parameters
    ----------
    case : Case
    fuels : sequence of str
        Catalogue names or blends by volume.
    hold : {"exit-temperature", "heat", "valve"}
        What stays the same at each operating point: exit temperature, heat input on the lower
        heating value, or injector and pressure ahead of it.
    ladder : Ladder, optional
        Shares of one fuel added to the case's own, besides.
    injector_ratio : float, optional
        Pressure ratio of the injector at the design point on the case's own fuel; from
        ``fuel.supply_pressure`` where left out, else 1.3.
    report : callable, optional
        Told how many ratings are done, and of how many.

    Raises
    ------
    InputError
        No fuel asked for, a name that is no fuel, before any work.
    """
    names = _asked(case, fuels, hold, ladder, injector_ratio)
    comparison = compared(case, names)
    study = _Study(case, comparison, hold, injector_ratio, report)
    baseline, switched = study.baseline(), study.switched()
    found = _ladder(ladder, switched, names) if ladder is not None else None
    return Switch(
        title=case.title,
        case_sha256=case.sha256,
        hold=hold,
        mechanism_note=comparison.own.mechanism_note,
        injector_ratio=study.ratio,
        injector_ratio_source=study.ratio_source,
        baseline=baseline,
        fuels=switched,
        refused=comparison.refused,
        ladder=found,
        sized=case.hardware is None,
    )


def _asked(
    case: Case,
    fuels: Sequence[str],
    hold: str,
    ladder: Ladder | None,
    injector_ratio: float | None,
) -> tuple[str, ...]:
    problems: list[Problem] = []
    if hold not in HOLDS:
        problems.append(Problem("not something to hold", ", ".join(HOLDS), "--hold", hold))
    if injector_ratio is not None and not 1.0 < injector_ratio <= 20.0:
        problems.append(
            Problem("outside its range", "above 1, up to 20", "--injector-ratio", injector_ratio)
        )
    if not fuels and ladder is None:
        problems.append(Problem("no other fuel is named", "give --to FUEL, or --ladder", "--to"))
    if problems:
        raise InputError(problems)
    rungs = () if ladder is None else rungs_of(case, ladder)
    names = tuple(dict.fromkeys((*fuels, *rungs)))
    check_names(names)
    return names


class _Study:
    """One comparison: metal, baseline and what is rated against it."""

    def __init__(
        self,
        case: Case,
        comparison: Comparison,
        hold: Hold,
        injector_ratio: float | None,
        report: Report | None,
    ) -> None:
        self.case, self.hold, self.report = case, hold, report
        self.gas, self.own, self.fuels = comparison.gas, comparison.own, comparison.fuels
        self.hardware = self._metal()
        self.settings = settings_of(case.model)
        self.done, self.total = 0, (1 + len(self.fuels)) * len(case.points)
        self.solutions: dict[str, Coupled] = {}
        self.own_points = tuple(self._own_point(point) for point in case.points)
        self.ratio, self.ratio_source = self._ratio(injector_ratio)
        design = self._design(self.own_points)
        self.nozzle = nozzle_of(self.gas, self.own, design, self.ratio, case.fuel.temperature)
        self.own_uses = self._uses(self.own, self.own_points, self.nozzle, ())

    def baseline(self) -> Switched:
        """Return the case's own fuel."""
        properties = properties_of(self.case, self.own, self.gas)
        limits = limits_of(self.case, properties, self.own_points, None)
        return Switched(
            properties,
            self.own_points,
            self.own_uses,
            limits,
            (),
            verdict_of(limits, ()),
            tuple(reasons_of(None, properties, (), self.own_points, self.own_uses, limits, "")),
        )

    def switched(self) -> tuple[Switched, ...]:
        """Return every other fuel."""
        return tuple(self._switched(fuel) for fuel in self.fuels)

    def _switched(self, fuel: Fuel) -> Switched:
        own = properties_of(self.case, self.own, self.gas)
        properties = properties_of(self.case, fuel, self.gas)
        points = tuple(
            self._point(point, fuel, rated)
            for point, rated in zip(self.case.points, self.own_points, strict=True)
        )
        uses = self._uses(fuel, points, self.nozzle, self.own_uses)
        limits = limits_of(self.case, properties, points, own, self.own_points)
        changes = changes_of(
            self.case,
            self.hardware,
            self._inlet(),
            self.own_points,
            points,
            uses,
            limits,
            partial(self._on_other_metal, fuel),
        )
        nox, mechanism = self._by_its_own(fuel, points)
        reasons = reasons_of(own, properties, self.own_points, points, uses, limits, self.hold)
        return Switched(
            properties,
            points,
            uses,
            limits,
            changes,
            verdict_of(limits, changes),
            tuple(reasons),
            nox,
            mechanism,
        )

    def _metal(self) -> Hardware:
        if self.case.hardware is not None:
            return hardware_of(self.case)
        fuel = fuel_of(self.case)
        return size(self.case, fuel, Gas.load(fuel.mechanism)).hardware

    def _design(self, points: Sequence[PointRating]) -> PointRating:
        return next(p for p in points if p.name == self.case.targets.design_point)

    def _inlet(self) -> Inlet:
        return operating_of(self.case, self.case.design_point, self.own, self.gas).inlet

    def _ratio(self, stated: float | None) -> tuple[float, str]:
        supply, design = self.case.fuel.supply_pressure, self.case.design_point
        if stated is not None:
            return stated, "as asked for"
        if supply is not None and supply > 1.01 * design.inlet_pressure:
            return supply / design.inlet_pressure, "fuel.supply_pressure, no valve between"
        return DEFAULT_PRESSURE_RATIO, f"{DEFAULT_RATIO.source} ({DEFAULT_RATIO.reading})"

    def _own_point(self, point: Point) -> PointRating:
        rated, solution = rate_near(
            self.case, point, self.own, self.gas, self.hardware, self.settings, None, True
        )
        # where one fuel goes out says nothing of another
        self.solutions[point.name] = replace(solution, blowout=None)
        self._tell()
        return rated

    def _point(self, point: Point, fuel: Fuel, own: PointRating) -> PointRating:
        held = self._held(point, fuel, own)
        try:
            if held is None:
                return _without(point, fuel, "the injector cannot be followed to this fuel")
            near = self.solutions[point.name] if own.status == "burning" else None
            rated = self._rated(held, fuel, near)
            if rated.status == "not_converged" and near is not None:
                # another fuel's solution can be a poor start where streams go out
                rated = self._rated(held, fuel, None)
            return rated
        except InfeasibleError as error:
            return _without(point, fuel, str(error))
        finally:
            self._tell()

    def _rated(self, point: Point, fuel: Fuel, near: Coupled | None) -> PointRating:
        return rate_near(
            self.case, point, fuel, self.gas, self.hardware, self.settings, near, True
        )[0]

    def _on_other_metal(self, fuel: Fuel, hardware: Hardware) -> PointRating | None:
        """Return the design point on a fuel and changed metal, or None where it does not burn."""
        point, own = self.case.design_point, self._design(self.own_points)
        held = self._held(point, fuel, own)
        if held is None:
            return None
        try:
            rated = rate_point(self.case, held, fuel, self.gas, hardware, self.settings)
        except InfeasibleError:
            return None
        return rated if rated.status == "burning" else None

    def _held(self, point: Point, fuel: Fuel, own: PointRating) -> Point | None:
        """Return the operating point with what is held instead of what was stated."""
        if own.status != "burning" or own.fuel_flow is None:
            return point
        free: dict[str, float | None] = {
            "exit_temperature": None,
            "fuel_flow": None,
            "fuel_air_ratio": None,
        }
        if self.hold == "exit-temperature":
            free["exit_temperature"] = own.exit.temperature
        elif self.hold == "heat":
            free["fuel_flow"] = (
                own.fuel_flow * self.own.lower_heating_value / fuel.lower_heating_value
            )
        else:
            use = next(use for use in self.own_uses if use.point == point.name)
            free["fuel_flow"] = valve_flow(self.gas, fuel, own, use, self.nozzle)
            if free["fuel_flow"] is None:
                return None
        return point.model_copy(update=free)

    def _uses(
        self,
        fuel: Fuel,
        points: Sequence[PointRating],
        nozzle: Nozzle,
        own: Sequence[InjectorUse],
    ) -> tuple[InjectorUse, ...]:
        before = {use.point: use for use in own}
        return tuple(
            use_of(self.gas, fuel, point, nozzle, before.get(point.name)) for point in points
        )

    def _by_its_own(self, fuel: Fuel, points: Sequence[PointRating]) -> tuple[float | None, str]:
        """Return NOx at the design point by the mechanism this fuel alone would be given."""
        if self.case.model.mechanism is not None:
            return None, ""
        alone = catalogue.find(fuel.name)
        design = self._design(points)
        called = alone.mechanism_note.partition(":")[0]
        if called == fuel.mechanism_note.partition(":")[0] or design.fuel_flow is None:
            return None, ""
        flow: dict[str, float | None] = {
            "exit_temperature": None,
            "fuel_air_ratio": None,
            "fuel_flow": design.fuel_flow,
        }
        point = self.case.design_point.model_copy(update=flow)
        try:
            rated = rate_point(
                self.case, point, alone, Gas.load(alone.mechanism), self.hardware, self.settings
            )
        except CombustorError:
            return None, ""
        made = rated.emissions
        return (None if made is None else made.nox_dry_15), called

    def _tell(self) -> None:
        self.done += 1
        if self.report is not None:
            self.report(self.done, self.total)


def _without(point: Point, fuel: Fuel, why: str) -> PointRating:
    """Return a point that could not be rated on a fuel."""
    return PointRating(
        name=point.name,
        kind=point.kind,
        fuel=fuel.name,
        status="not_converged",
        inlet=InletRecord(
            point.air_flow, point.inlet_pressure, point.inlet_temperature, point.humidity
        ),
        fuel_flow=None,
        fuel_air_ratio=None,
        equivalence_ratio=None,
        operability=NOTHING,
        convergence=Convergence(False, float("inf"), 0, why),
    )


def _ladder(ladder: Ladder, switched: Sequence[Switched], names: Sequence[str]) -> Rung:
    by_name = {one.properties.fuel.name: one for one in switched}
    rungs = [
        (share, by_name.get(catalogue.find(name).name))
        for share, name in zip(ladder.shares, names[-len(ladder.shares) :], strict=True)
    ]
    first = _climb(rungs, ())
    second = _climb(rungs, (NOZZLE,))
    return Rung(ladder.added, *first, *second)


def _climb(
    rungs: Sequence[tuple[float, Switched | None]], allowed: tuple[str, ...]
) -> tuple[float | None, Limit | None]:
    best: float | None = None
    for share, one in rungs:
        if one is None:
            return best, None
        broken = [limit for limit in one.broken if limit.what not in allowed]
        if broken:
            return best, broken[0]
        best = share
    return best, None
