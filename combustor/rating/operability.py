"""Will it stay lit, light, and keep its flame out of the premixer: one rated point judged."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field

from combustor.base.finding import Finding, Level
from combustor.base.method import Method
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.hardware.metal import Hardware
from combustor.kinetics.extinction import (
    STIRRED_BLOWOUT,
    FuelBlowout,
    blowout_fuel_flow,
    blowout_residence_time,
    rich_blowout_fuel_flow,
)
from combustor.kinetics.primary import PrimaryZone
from combustor.operability import blowout, loading
from combustor.rating.couple import Coupled
from combustor.rating.fire import chain_pressure, layout_of, primary_of
from combustor.rating.operating import Operating
from combustor.rating.premixer import TIME_LAG_DIFFUSION, diffusion_time_lag, premixer_of
from combustor.rating.record import PointRating
from combustor.rating.settings import Settings
from combustor.rating.walls import heat_losses_of

BLOWOUT_MARGIN = Method(
    key="blowout-margin",
    quantity="margin of fuel over lean blow-out",
    source="1 - fuel at blow-out over operating fuel, air, pressure and temperature held; 15 % "
    "asked of a steady point, 30 % where the engine decelerates",
    reading="common practice, no source",
    note="fuel is reduced along the burning branch of the chain's own primary zone until its mean "
    "goes out; steps end at 5 % of the fuel, so the ratio is at most that much too high",
)

# The search for blow-out: boldest first step and the step at which losing the branch ends it.
BOLDEST, FINEST = 0.7, 0.95
STEADY_MARGIN, DECELERATION_MARGIN, LEAST_MARGIN = 15.0, 30.0, 5.0  # %
AMPLE_TIME, RELIGHT_TIME = 5.0, 2.0  # residence time over that of blow-out
LARGEST_DROPS = 80e-6  # m, of a spray that lights
CO_HEAT = 10.103e6  # J/kg, ISO 6976:2016

KEYS = (
    "blowout_fuel_air_ratio",
    "blowout_margin_percent",
    "blowout_primary_equivalence_ratio",
    "blowout_fuel_air_ratio_correlation",
    "rich_limit_primary_equivalence_ratio",
    "residence_time_over_blowout",
    "ignition_loading_1e6",
    "light_off_fuel_air_ratio_correlation",
    "efficiency_loss_co_percent",
    "efficiency_loss_unburnt_percent",
    "efficiency_loss_evaporation_percent",
    "premixer_time_ms",
    "autoignition_delay_ms",
    "autoignition_margin",
    "burning_velocity_m_s",
    "flashback_core_margin",
    "flashback_wall_margin",
    "convective_time_lag_ms",
)
NOTHING: Mapping[str, float | None] = dict.fromkeys(KEYS)


@dataclass(frozen=True)
class Operability:
    """What was judged of one point: values by key, findings, and the methods behind them.

    ``blowout`` is the search for lean blow-out, for a neighbour's to start from.
    """

    values: Mapping[str, float | None] = field(default_factory=lambda: NOTHING)
    findings: tuple[Finding, ...] = ()
    methods: tuple[Method, ...] = ()
    blowout: FuelBlowout | None = None


def operability_of(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    fuel: Fuel,
    coupled: Coupled,
    settings: Settings,
    rated: PointRating,
    near: FuelBlowout | None = None,
) -> Operability:
    """Judge a burning point.

    Parameters
    ----------
    rated : PointRating
        The point, emissions and injectors known.
    near : FuelBlowout, optional
        Of a neighbouring point, to save time.
    """
    fire = coupled.fire
    ready = fire.fuel_flow * fire.primary_vapour
    primary = primary_of(
        operating, hardware, layout_of(hardware, settings), coupled.split, ready, settings
    )
    zone = next(zone for zone in rated.zones if zone.name == "primary")
    values: dict[str, float | None] = dict(NOTHING)
    found = _lean_limit(gas, coupled, primary, near)
    values |= _blowout(operating, coupled, found, zone.equivalence_ratio)
    values |= _mixed_zone(gas, coupled, primary, zone.equivalence_ratio, zone.residence_time or 0.0)
    values |= _correlated(operating, hardware, fuel)
    values |= _efficiency_loss(fuel, rated, coupled)
    lag = diffusion_time_lag(hardware, coupled)
    values["convective_time_lag_ms"] = None if lag is None else 1e3 * lag
    methods: list[Method] = [BLOWOUT_MARGIN, STIRRED_BLOWOUT, blowout.LEAN_BLOWOUT_LEFEBVRE]
    methods.append(TIME_LAG_DIFFUSION)
    findings = list(_findings(operating, fuel, values, zone.equivalence_ratio))
    if operating.kind == "relight":
        findings += _drops(coupled)
        methods += [loading.IGNITION_LOADING, blowout.LEAN_LIGHT_OFF_LEFEBVRE]
    for judged in (
        premixer_of(gas, operating, hardware, fuel, coupled, one)
        for one in rated.injectors
        if one.is_premixed and one.fuel_share > 0.0
    ):
        values = _worse(values, judged.values)
        findings += judged.findings
        methods += judged.methods
    return Operability(values, tuple(findings), tuple(methods), found)


def deceleration(points: Sequence[PointRating]) -> tuple[Finding, ...]:
    """Judge a sudden cut to the least fuel of the duty cycle while the air has not yet followed.

    Parameters
    ----------
    points : sequence of PointRating
        Of one case.
    """
    fuels = [(p.fuel_flow, p.name) for p in points if p.status == "burning" and p.fuel_flow]
    if len(fuels) < 2:
        return ()
    least, where = min(fuels)
    holds = []
    for point in points:
        ratio = point.operability.get("blowout_fuel_air_ratio")
        if ratio is None or point.name == where:
            continue
        needed = ratio * point.inlet.air_flow / (1.0 + point.inlet.humidity)
        if needed > least:
            holds.append(f"{needed:.4f} kg/s at the air of {point.name}")
    if not holds:
        return ()
    return (
        Finding(
            "watch",
            f"fuel cut at once to that of {where}",
            least,
            None,
            "kg/s",
            f"blows out while the air has not followed: hold at least {', '.join(holds)} on the "
            "way down.",
            BLOWOUT_MARGIN.citation,
        ),
    )


def _lean_limit(
    gas: Gas, coupled: Coupled, primary: PrimaryZone, near: FuelBlowout | None
) -> FuelBlowout | None:
    fire = coupled.fire
    return blowout_fuel_flow(
        gas,
        chain_pressure(coupled.split),
        primary,
        heat_losses_of(fire, coupled.walls)[0],
        fire.chain.states[0],
        BOLDEST,
        FINEST,
        near,
    )


def _blowout(
    operating: Operating,
    coupled: Coupled,
    found: FuelBlowout | None,
    equivalence_ratio: float,
) -> dict[str, float | None]:
    if found is None or not found.reached:
        return {}
    return {
        "blowout_fuel_air_ratio": found.share * coupled.fire.fuel_flow / operating.dry_air_flow,
        "blowout_margin_percent": 100.0 * (1.0 - found.share),
        "blowout_primary_equivalence_ratio": found.share * equivalence_ratio,
    }


def _mixed_zone(
    gas: Gas,
    coupled: Coupled,
    primary: PrimaryZone,
    equivalence_ratio: float,
    residence_time: float,
) -> dict[str, float | None]:
    """Return the limits of the primary zone taken as one perfectly mixed reactor."""
    pressure = chain_pressure(coupled.split)
    rich = rich_blowout_fuel_flow(gas, pressure, primary)
    fuel, air = primary.fuel, primary.air
    flow = fuel.mass_flow + air.mass_flow
    shares = fuel.mass_flow / flow, air.mass_flow / flow
    mixture = shares[0] * fuel.mass_fractions + shares[1] * air.mass_fractions
    enthalpy = shares[0] * fuel.enthalpy + shares[1] * air.enthalpy
    shortest = blowout_residence_time(gas, pressure, enthalpy, mixture)
    found: dict[str, float | None] = {}
    if rich is not None and rich.reached:
        found["rich_limit_primary_equivalence_ratio"] = (
            equivalence_ratio * rich.fuel_flow / fuel.mass_flow
        )
    if shortest is not None:
        found["residence_time_over_blowout"] = residence_time / shortest.residence_time
    return found


def _correlated(operating: Operating, hardware: Hardware, fuel: Fuel) -> dict[str, float | None]:
    inlet = operating.inlet
    diluted = [zone.end for zone in hardware.zones if zone.name != "dilution"]
    volume = hardware.volume(0.0, max(diluted))
    at = (inlet.mass_flow, volume, inlet.pressure, inlet.temperature, fuel.lower_heating_value)
    found: dict[str, float | None] = {
        "blowout_fuel_air_ratio_correlation": blowout.lean_blowout_lefebvre(*at),
        "ignition_loading_1e6": 1e-6
        * loading.ignition_loading(
            inlet.pressure,
            hardware.reference_area,
            hardware.reference_height,
            inlet.temperature,
            inlet.mass_flow,
        ),
    }
    if operating.kind == "relight":
        found["light_off_fuel_air_ratio_correlation"] = blowout.lean_light_off_lefebvre(*at)
    return found


def _efficiency_loss(fuel: Fuel, rated: PointRating, coupled: Coupled) -> dict[str, float | None]:
    made = rated.emissions
    if made is None or made.combustion_efficiency is None or made.ei_co is None:
        return {}
    lost = 100.0 * (1.0 - made.combustion_efficiency)
    monoxide = 100.0 * made.ei_co * CO_HEAT / fuel.lower_heating_value
    unburnt = max(lost - monoxide, 0.0)
    spray = coupled.evaporation
    # what is liquid to the end leaves as unburnt vapour, so far as the last cell does not burn it
    wet = None if spray is None else min(100.0 * spray.left, unburnt)
    return {
        "efficiency_loss_co_percent": monoxide,
        "efficiency_loss_unburnt_percent": unburnt - (wet or 0.0),
        "efficiency_loss_evaporation_percent": wet,
    }


def _findings(
    operating: Operating,
    fuel: Fuel,
    values: Mapping[str, float | None],
    equivalence_ratio: float,
) -> Iterator[Finding]:
    yield _margin_finding(operating, values)
    time = values["residence_time_over_blowout"]
    asked = RELIGHT_TIME if operating.kind == "relight" else AMPLE_TIME
    if time is not None and time < asked:
        yield Finding(
            "watch",
            "residence time over that of blow-out, mixed primary zone",
            time,
            asked,
            "-",
            f"A primary zone {asked / time:.1f} times larger holds as a design should.",
            STIRRED_BLOWOUT.citation,
        )
    if operating.kind == "relight":
        yield from _relight(operating, fuel, values, equivalence_ratio)


def _margin_finding(operating: Operating, values: Mapping[str, float | None]) -> Finding:
    margin = values["blowout_margin_percent"]
    asked = STEADY_MARGIN if operating.kind == "relight" else DECELERATION_MARGIN
    if margin is None:
        return Finding(
            "ok",
            "lean blow-out: none down to 1 % of the fuel",
            source=BLOWOUT_MARGIN.citation,
        )
    level: Level = "act" if margin < LEAST_MARGIN else "watch" if margin < asked else "ok"
    advice = ""
    if level != "ok":
        advice = (
            f"Goes out at a fuel-air ratio of {values['blowout_fuel_air_ratio']:.5f}: less primary "
            "air, or a pilot that burns its share of the fuel richer; keep the fuel above it on "
            "the way down."
        )
    return Finding(level, "blow-out margin", margin, asked, "%", advice, BLOWOUT_MARGIN.citation)


def light_up_findings(
    operating: Operating, hardware: Hardware, fuel: Fuel, coupled: Coupled
) -> tuple[Finding, ...]:
    """Judge loading and spray of a relight point that does not burn; nothing of other points."""
    if operating.kind != "relight":
        return ()
    values = _correlated(operating, hardware, fuel)
    return (*_relight(operating, fuel, values, None), *_drops(coupled))


def _drops(coupled: Coupled) -> Iterator[Finding]:
    """Judge the spray at light-up."""
    spray = coupled.evaporation
    if spray is None:
        return
    level: Level = "ok" if spray.drop_size <= LARGEST_DROPS else "watch"
    advice = (
        f"{100.0 * spray.shares[0]:.0f} % of the fuel is vapour in the primary zone; fuel for lean "
        "light-off rises with drop size squared."
    )
    if level == "watch":
        advice += " A start nozzle, or more pressure across the atomiser, makes finer drops."
    yield Finding(
        level,
        "drop size at light-up",
        1e6 * spray.drop_size,
        1e6 * LARGEST_DROPS,
        "um",
        advice,
        "sprays much above 80 um seldom light (judgement)",
    )


def _relight(
    operating: Operating,
    fuel: Fuel,
    values: Mapping[str, float | None],
    equivalence_ratio: float | None,
) -> Iterator[Finding]:
    theta = values["ignition_loading_1e6"]
    assert theta is not None
    certain, hopeless = 1e-6 * loading.CERTAIN_LIGHT, 1e-6 * loading.HOPELESS_LIGHT
    level: Level = "act" if theta < hopeless else "watch" if theta < certain else "ok"
    advice = ""
    if level != "ok":
        wider = (certain / theta) ** (1.0 / 2.75)
        advice = (
            f"Between {hopeless:g} and {certain:g} lighting depends on spray and igniter: a casing "
            f"{wider:.2f} times as wide, or a lower relight altitude, is certain."
        )
    yield Finding(
        level,
        "loading at light-up",
        theta,
        certain,
        "1e6",
        advice,
        loading.IGNITION_LOADING.citation,
    )
    limit = loading.lean_flammable_limit(dict(fuel.composition), operating.inlet.temperature)
    if limit is None or equivalence_ratio is None:
        return
    moles = limit / (1.0 - limit) * fuel.molar_mass / 0.028965
    least = moles / fuel.stoichiometric_fuel_air_ratio
    level = "ok" if equivalence_ratio > 1.2 * least else "watch"
    level = "act" if equivalence_ratio < least else level
    yield Finding(
        level,
        "primary equivalence ratio at light-up",
        equivalence_ratio,
        least,
        "-",
        "" if level == "ok" else "More light-up fuel: the igniter needs a mixture that burns.",
        loading.FLAMMABLE_LIMITS.citation,
    )


_MARGINS = ("autoignition_margin", "flashback_core_margin", "flashback_wall_margin")


def _worse(
    values: Mapping[str, float | None], more: Mapping[str, float | None]
) -> dict[str, float | None]:
    """Return the values with those of an injector, the one with the least margin kept."""

    def least(of: Mapping[str, float | None]) -> float:
        known = [value for key in _MARGINS if (value := of.get(key)) is not None]
        return min(known, default=float("inf"))

    if values.get("premixer_time_ms") is not None and least(values) <= least(more):
        return dict(values)
    return {**values, **more}
