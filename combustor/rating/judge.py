"""Judgements on a rated point: limits met, near or broken, and methods out of their range."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from combustor.base.finding import Finding, Level
from combustor.base.method import Method, Notice
from combustor.case.schema import Case, Point
from combustor.fuel.choose_mechanism import method_of
from combustor.fuel.record import Fuel
from combustor.hardware.zone_air import FRONT_ROLES
from combustor.kinetics.near_wall import NEAR_WALL
from combustor.rating.couple import Coupled
from combustor.rating.drilled import crowded_rows
from combustor.rating.record import PointRating
from combustor.rating.settings import RECIRCULATION, UNMIXEDNESS, Settings
from combustor.sizing.exit_pattern import JET_ROLES

PRACTICE = "common practice, no source"

LOSS_SLACK = 0.001  # of inlet pressure: what sizing itself promises
WALL_MARGIN = 25.0  # K
PATTERN_SLACK = 0.02
EFFICIENCY = {"rated": 0.995, "part": 0.99, "idle": 0.98, "relight": 0.8}
EMISSION_MARGIN = 0.85
ANNULUS_MACH = 0.10
EVAPORATED = 0.90
LEAST_QUENCH = 1.0  # ppm of CO
QUENCH_SHARE = 0.25  # of all CO, above which the films decide it
RICH_FROM = 1.2
RICH_CHEMISTRY = Method(
    key="rich-nitrogen-chemistry",
    quantity="NOx of rich flames by GRI-Mech 3.0 over that of newer nitrogen chemistry",
    source="stirred reactors on kerosene, 4 to 20 bar, 0.05 to 3 ms, against the model of Xu, Wang "
    "et al. 2018 with the nitrogen chemistry of Saggese et al. 2020",
    reading="computed",
    scatter="1.7 to 2.6 at 1.4, 3 to 10 at 1.6",
)


def findings_of(
    case: Case, point: Point, rated: PointRating, coupled: Coupled, fuel: Fuel, settings: Settings
) -> tuple[Finding, ...]:
    """Return every judgement on one point, the gravest first."""
    if rated.status != "burning":
        return (_no_result(rated, coupled),)
    found = [
        *_loss(case, point, rated),
        *_wall(case, rated),
        *_pattern(case, point, rated),
        *_efficiency(point, rated),
        *_emissions(case, rated),
        *_jets(rated),
        *_wall_quench(rated),
        *_annulus(rated, coupled),
        *_spray(coupled),
        *_rich_chemistry(rated, fuel),
        *(crowded_rows(rated.hardware) if rated.hardware else ()),
        *_measured_openings(case),
        *_notices(rated, coupled, fuel, settings),
    ]
    return gravest_first(found)


def gravest_first(found: Iterable[Finding]) -> tuple[Finding, ...]:
    """Return findings sorted by level, in their own order within one."""
    order = {"act": 0, "watch": 1, "ok": 2}
    return tuple(sorted(found, key=lambda finding: order[finding.level]))


def _no_result(rated: PointRating, coupled: Coupled) -> Finding:
    if rated.status == "blown_out":
        return Finding(
            "act",
            "flame: blown out",
            advice="No burning state of the primary zone exists here: give it more fuel, less "
            "primary air or more volume, or a lower unmixedness if that is better known.",
            source="burning branch followed from a long residence time",
        )
    return Finding(
        "act",
        "not converged",
        advice=f"No number of this point is a result: {coupled.convergence.message}.",
        source="coupled solve of air split, fire and wall",
    )


def _loss(case: Case, point: Point, rated: PointRating) -> Iterator[Finding]:
    target, loss = case.targets.pressure_loss, rated.pressure_loss
    if target is None or loss is None:
        return
    excess = loss - target
    if point.name == case.targets.design_point:
        level: Level = "act" if excess > LOSS_SLACK else "ok"
        advice = ""
        if level == "act":
            area = 100.0 * ((loss / target) ** 0.5 - 1.0)
            advice = f"Open about {area:.0f} % more effective hole area in all rows alike."
        source = "target of the case at its design point"
    else:
        level = "watch" if excess > LOSS_SLACK else "ok"
        advice = "Corrected flow is higher here than at the design point." if excess > 0 else ""
        source = "target of the design point, for comparison"
    yield Finding(level, "pressure loss", 100 * loss, 100 * target, "%", advice, source)


def _wall(case: Case, rated: PointRating) -> Iterator[Finding]:
    if not rated.walls:
        return
    limit = case.targets.wall_temperature
    hottest = max(rated.walls, key=lambda wall: wall.temperature)
    level: Level = "ok"
    advice = ""
    if hottest.temperature > limit:
        level = "act"
    elif hottest.temperature > limit - WALL_MARGIN:
        level = "watch"
    if level != "ok":
        advice = (
            f"Hottest at x = {1000 * hottest.station:.0f} mm ({hottest.side}): put a slot just "
            "upstream of it or feed the one there with more air."
        )
    yield Finding(
        level,
        "peak wall temperature",
        hottest.temperature,
        limit,
        "K",
        advice,
        "one-dimensional heat balance; target of the case",
    )


def _pattern(case: Case, point: Point, rated: PointRating) -> Iterator[Finding]:
    value, target = rated.exit.pattern_factor, case.targets.pattern_factor
    if value is None or point.kind != "rated":
        return
    level: Level = "ok"
    advice = ""
    if value > target:
        level = "act" if value > target + PATTERN_SLACK else "watch"
        advice = "A longer liner or more liner pressure loss evens the exit temperature out."
    yield Finding(level, "pattern factor", value, target, "", advice, "Lefebvre 1984, from memory")


def _efficiency(point: Point, rated: PointRating) -> Iterator[Finding]:
    value, limit = rated.exit.combustion_efficiency, EFFICIENCY[point.kind]
    if value is None:
        return
    level: Level = "ok" if value >= limit else "watch"
    advice = "" if level == "ok" else "Less primary air, more volume or better mixing at this load."
    yield Finding(level, "combustion efficiency", 100 * value, 100 * limit, "%", advice, PRACTICE)


def _emissions(case: Case, rated: PointRating) -> Iterator[Finding]:
    wanted, made = case.targets.emissions, rated.emissions
    if made is None:
        return
    pairs = (("NOx", made.nox_dry_15, wanted.nox), ("CO", made.co_dry_15, wanted.co))
    for name, value, limit in pairs:
        if value is None:
            yield Finding(
                "watch",
                f"{name} at 15 % O2: undefined",
                advice="The exhaust is rich or has more than 20 % O2 dry: use the emission index.",
                source="definition of the reference",
            )
        elif limit is not None:
            level: Level = "ok" if value <= EMISSION_MARGIN * limit else "watch"
            level = "act" if value > limit else level
            advice = "" if level == "ok" else "See primary equivalence ratio and residence time."
            yield Finding(
                level,
                f"{name} dry, 15 % O2",
                1e6 * value,
                1e6 * limit,
                "ppm",
                advice,
                "target of the case",
            )


def _jets(rated: PointRating) -> Iterator[Finding]:
    if rated.split is None or rated.hardware is None:
        return
    height = rated.hardware.liner_height
    for jet in rated.split.openings:
        if jet.role not in JET_ROLES or jet.penetration is None or jet.mass_flow <= 0.0:
            continue
        depth = jet.penetration / height
        if depth > 0.5:
            advice = "Jets overshoot the middle: more and smaller holes in this row."
        elif depth < 0.2:
            advice = "Jets stay near the wall: fewer and larger holes in this row."
        else:
            continue
        yield Finding(
            "watch",
            f"penetration of {jet.name} over liner height",
            depth,
            0.33,
            "",
            advice,
            PRACTICE,
        )


def _wall_quench(rated: PointRating) -> Iterator[Finding]:
    """Judge the carbon monoxide that film air keeps from burning, where it counts."""
    share = rated.near_wall.get("co_beside_wall_percent")
    quenched = rated.near_wall.get("co_quenched_at_wall_ppmvd_15")
    made = None if rated.emissions is None else rated.emissions.co_dry_15
    if share is None or quenched is None or made is None or quenched < LEAST_QUENCH:
        return
    yield Finding(
        "watch" if quenched > QUENCH_SHARE * 1e6 * made else "ok",
        "CO from quenching at the wall",
        quenched,
        QUENCH_SHARE * 1e6 * made,
        "ppm",
        f"{share:.0f} % of the CO leaves the liner beside the wall: less film air upstream, or a "
        "hotter wall, burns more of it.",
        NEAR_WALL.citation,
    )


def _annulus(rated: PointRating, coupled: Coupled) -> Iterator[Finding]:
    inlet = rated.inlet
    sound = (1.38 * 287.0 * inlet.temperature) ** 0.5
    for annulus in coupled.split.annuli:
        fastest = float(abs(annulus.velocity).max())
        if fastest / sound > ANNULUS_MACH:
            yield Finding(
                "watch",
                f"velocity in the {annulus.side} annulus",
                fastest,
                ANNULUS_MACH * sound,
                "m/s",
                "Rows near its fast end flow less than their area says: widen the annulus.",
                PRACTICE,
            )


def _rich_chemistry(rated: PointRating, fuel: Fuel) -> Iterator[Finding]:
    ratios = [zone.equivalence_ratio for zone in rated.zones if zone.name == "primary"]
    ratios += [one.primary_equivalence_ratio for one in rated.injectors if one.fuel_share > 0.0]
    richest = max(ratios, default=0.0)
    if richest > RICH_FROM:
        yield Finding(
            "watch",
            "NOx from a rich flame",
            richest,
            RICH_FROM,
            "-",
            "Rich nitrogen chemistry differs between mechanisms by 1.1 to 1.7 at an equivalence "
            "ratio of 1.2, 1.7 to 2.6 at 1.4 and 3 to 10 at 1.6: take NOx as a trend, or state a "
            "mechanism made for it.",
            RICH_CHEMISTRY.citation,
        )


def _measured_openings(case: Case) -> Iterator[Finding]:
    if case.hardware is None:
        return
    unsaid = [
        row.name
        for row in case.hardware.openings
        if row.effective_area is not None and row.feed is None and row.side != "dome"
    ]
    unsaid = [name for name in unsaid if _sees_an_annulus(case, name)]
    if unsaid:
        yield Finding(
            "watch",
            "pressure pair of a measured effective area",
            advice="State feed for "
            + ", ".join(unsaid)
            + ': "total" if the bench referred to annulus total and liner static pressure, '
            '"static" if to static on both sides; the two differ by the annulus head.',
            source=PRACTICE,
        )


def _sees_an_annulus(case: Case, name: str) -> bool:
    assert case.hardware is not None
    row = next(row for row in case.hardware.openings if row.name == name)
    return row.role not in FRONT_ROLES


def _spray(coupled: Coupled) -> Iterator[Finding]:
    spray = coupled.evaporation
    if spray is None:
        return
    ready = spray.shares[0]
    level: Level = "ok" if ready >= EVAPORATED else "watch"
    advice = f"Sauter mean drop size {1e6 * spray.drop_size:.0f} um."
    if level == "watch":
        advice += (
            " The rest burns late and leaves carbon monoxide: finer drops (drop size to the "
            "second power counts), hotter air or more primary volume."
        )
    yield Finding(
        level,
        "fuel evaporated in the primary zone",
        100 * ready,
        100 * EVAPORATED,
        "%",
        advice,
        "evaporation by the square of the diameter; limit common practice",
    )


def _notices(
    rated: PointRating, coupled: Coupled, fuel: Fuel, settings: Settings
) -> Iterator[Finding]:
    notices: list[Notice] = [
        *coupled.split.notices,
        *coupled.fire.chain.notices,
        *(notice for wall in coupled.walls for notice in wall.notices),
        *UNMIXEDNESS.notices(unmixedness=settings.unmixedness),
        *(() if coupled.evaporation is None else coupled.evaporation.notices),
        *RECIRCULATION.notices(recirculation=settings.recirculation),
        *_of_mechanism(rated, fuel),
    ]
    # one finding a quantity that left a range, whatever number of methods and places it did so
    by_quantity: dict[str, list[Notice]] = {}
    for notice in notices:
        by_quantity.setdefault(notice.quantity, []).append(notice)
    for quantity, left in by_quantity.items():
        worst = max(left, key=_excess)
        methods = tuple(dict.fromkeys(notice.method for notice in left))
        of_methods = "of its method" if len(methods) == 1 else f"of {len(methods)} methods"
        yield Finding(
            "watch",
            f"{quantity.replace('_', ' ')} outside the range {of_methods}",
            worst.value,
            worst.high if worst.value > worst.high else worst.low,
            "",
            str(worst),
            ", ".join(methods),
        )


def _excess(notice: Notice) -> float:
    """Return how far a value lies outside its range, over the range."""
    beyond = max(notice.low - notice.value, notice.value - notice.high)
    return beyond / max(notice.high - notice.low, 1e-12)


def _of_mechanism(rated: PointRating, fuel: Fuel) -> tuple[Notice, ...]:
    method = method_of(fuel.mechanism)
    if "pressure" not in method.validity:
        return ()
    return method.notices(pressure=rated.inlet.pressure)
