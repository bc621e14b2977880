"""One injector's premixing passage at one point: does the charge stay unlit until the dome."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from combustor import gasdynamics
from combustor.base.finding import Finding, Level
from combustor.base.method import Method
from combustor.fuel.gas import Gas
from combustor.fuel.record import Fuel
from combustor.hardware.metal import Hardware, Injector, Swirler
from combustor.operability import autoignition, flashback
from combustor.operability.autoignition import Delay
from combustor.operability.burning_velocity import BurningVelocity, tabulated
from combustor.operability.ignition_kinetic import ignition_delay
from combustor.rating.couple import Coupled
from combustor.rating.injectors import InjectorAir
from combustor.rating.operating import Operating
from combustor.sizing.swirler import swirl_number

TIME_LAG = Method(
    key="convective-time-lag",
    quantity="time from injector to flame",
    source="length of the premixing passage over its velocity; the way from dome to flame not "
    "counted",
    reading="derived",
)

TIME_LAG_DIFFUSION = Method(
    key="convective-time-lag-diffusion",
    quantity="time from injector to flame where fuel and air meet in the liner",
    source="a third of the liner's height at the velocity of the dome's fastest air",
    reading="judgement",
    scatter="factor 2",
    note="for a first look at frequencies; combustion dynamics is not assessed",
)
SPRAY_IGNITES_AT = Method(
    key="autoignition-temperature-of-a-spray",
    quantity="temperature at which a sprayed fuel's ignition delay is taken",
    source="that of the air: vapour at the lean edge of a spray ignites first, before evaporation "
    "of the rest has cooled the air",
    reading="judgement",
    note="Jet A at half the stoichiometric fuel, all evaporated, leaves air of 800 K at 753 K",
)
FLAME_STAND_OFF = 1.0 / 3.0  # of the liner height

AMPLE = 1.5  # margin over what is asked from which nothing is said
COUNTED = 0.2  # s that the mechanism's delay is counted to, or this many times
COUNTED_TIMES = 30.0  # the residence time where that is more


@dataclass(frozen=True)
class Premixer:
    """What was judged of one injector's passage."""

    values: Mapping[str, float | None]
    findings: tuple[Finding, ...]
    methods: tuple[Method, ...]


@dataclass(frozen=True)
class Charge:
    """Fuel and air in the passage, mixed and unburnt.

    Parameters
    ----------
    temperature, pressure : float
        [K], [Pa]
    mass_fractions : ndarray
        [-]
    density, viscosity, diffusivity : float
        [kg/m3], kinematic and thermal [m2/s]
    velocity : float
        Mean in the passage [m/s]
    time : float
        In the passage [s]
    diameter : float
        Of a round passage of the same area [m]
    """

    temperature: float
    pressure: float
    mass_fractions: NDArray[np.float64]
    density: float
    viscosity: float
    diffusivity: float
    velocity: float
    time: float
    diameter: float


def premixer_of(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    fuel: Fuel,
    coupled: Coupled,
    air: InjectorAir,
) -> Premixer:
    """Judge autoignition and flashback in the passage of one premixed injector."""
    metal = next(one for one in hardware.injectors if one.name == air.name)
    charge = charge_of(gas, operating, hardware, coupled, air, metal)
    if charge is None:
        return Premixer(
            {},
            (
                Finding(
                    "watch",
                    f"autoignition and flashback in {air.name}: cannot say",
                    advice="State premix_length and premix_area of the injector.",
                    source="extent of this rating",
                ),
            ),
            (),
        )
    delay, others = delay_of(gas, operating, fuel, charge)
    hydrogen = fuel.composition.get("H2", 0.0)
    factor = autoignition.safety_factor(hydrogen, delay.is_extrapolated)
    velocity = tabulated(
        fuel.composition,
        air.equivalence_ratio,
        charge.temperature,
        charge.pressure,
    )
    values: dict[str, float | None] = {
        "premixer_time_ms": 1e3 * charge.time,
        "autoignition_delay_ms": 1e3 * delay.seconds,
        "autoignition_margin": delay.seconds / (factor * charge.time),
        "convective_time_lag_ms": 1e3 * charge.time,
    }
    findings = [_autoignition(air.name, charge, delay, factor, others)]
    methods = [delay.method, *(d.method for d in others), autoignition.SAFETY_FACTOR, TIME_LAG]
    if fuel.phase == "liquid":
        methods.append(SPRAY_IGNITES_AT)
    if velocity is None:
        findings.append(
            Finding(
                "watch",
                f"flashback in {air.name}: cannot say",
                advice=f"No burning velocity of {fuel.name} is known here.",
                source="extent of this rating",
            )
        )
    else:
        values |= _flashback_values(charge, velocity, hydrogen)
        findings += _flashback(air.name, values, velocity, air.equivalence_ratio)
        methods += [
            velocity.method,
            flashback.TURBULENT_VELOCITY_DAMKOEHLER,
            flashback.TURBULENT_VELOCITY_ZIMONT,
            flashback.WALL_GRADIENT,
            flashback.CRITICAL_GRADIENT,
            flashback.FLASHBACK_FACTORS,
            *((flashback.HYDROGEN_SPEED_UP,) if hydrogen > 0.0 else ()),
        ]
    findings += _vortex(hardware, metal, hydrogen)
    return Premixer(values, tuple(findings), tuple(methods))


def diffusion_time_lag(hardware: Hardware, coupled: Coupled) -> float | None:
    """Return the time from injector to flame in the liner [s]; source: ``TIME_LAG_DIFFUSION``."""
    dome = [flow.jet_velocity for flow in coupled.split.openings if flow.role == "swirler"]
    fastest = max(dome, default=0.0)
    return FLAME_STAND_OFF * hardware.liner_height / fastest if fastest > 0.0 else None


def charge_of(
    gas: Gas,
    operating: Operating,
    hardware: Hardware,
    coupled: Coupled,
    air: InjectorAir,
    metal: Injector,
) -> Charge | None:
    """Return what flows in the passage, or None where the metal does not say how large it is."""
    if metal.premix_length is None or metal.premix_area is None or air.own_air <= 0.0:
        return None
    fuel_flow = air.fuel_share * coupled.fire.fuel_flow
    flow = air.own_air + fuel_flow
    mixture = (air.own_air * operating.air + fuel_flow * operating.fuel) / flow
    enthalpy = (air.own_air * operating.air_enthalpy + fuel_flow * operating.fuel_enthalpy) / flow
    pressure = operating.inlet.pressure
    temperature = gas.temperature(enthalpy, pressure, mixture, operating.inlet.temperature)
    density = gas.density(temperature, pressure, mixture)
    capacity = gas.heat_capacity(temperature, pressure, mixture)
    area = metal.premix_area * hardware.cans
    velocity = flow / (density * area)
    passages = sum(hardware.opening(name).count for name in metal.openings) or 1
    return Charge(
        temperature=temperature,
        pressure=pressure,
        mass_fractions=mixture,
        density=density,
        viscosity=float(gasdynamics.viscosity_sutherland(temperature)) / density,
        diffusivity=float(gasdynamics.conductivity_sutherland(temperature)) / (density * capacity),
        velocity=velocity,
        time=metal.premix_length / velocity,
        diameter=float(np.sqrt(4.0 * metal.premix_area / (np.pi * passages))),
    )


def delay_of(
    gas: Gas, operating: Operating, fuel: Fuel, charge: Charge
) -> tuple[Delay, tuple[Delay, ...]]:
    """Return the shorter ignition delay, and the other where there are two.

    Source: ``SPRAY_IGNITES_AT`` for a liquid fuel.
    """
    sprayed = fuel.phase == "liquid"
    temperature = operating.inlet.temperature if sprayed else charge.temperature
    kinetic = ignition_delay(
        gas,
        temperature,
        charge.pressure,
        charge.mass_fractions,
        max(COUNTED, COUNTED_TIMES * charge.time),
    )
    moles = dict(zip(gas.species_names, gas.mole_fractions(charge.mass_fractions), strict=True))
    published = autoignition.correlated(
        fuel.composition,
        {name.upper(): float(share) for name, share in moles.items() if share > 0.0},
        temperature,
        charge.pressure,
        fuel.atoms.get("C", 0.0),
    )
    if published is None:
        return kinetic, ()
    first, second = sorted((kinetic, published), key=lambda delay: delay.seconds)
    return first, (second,)


def _autoignition(
    name: str, charge: Charge, delay: Delay, factor: float, others: tuple[Delay, ...]
) -> Finding:
    margin = delay.seconds / (factor * charge.time)
    level: Level = "act" if margin < 1.0 else "watch" if margin < AMPLE else "ok"
    said = " and more" if delay.is_bound else ""
    advice = f"Delay {1e3 * delay.seconds:.3g} ms{said} against {1e3 * charge.time:.3g} ms inside"
    if others:
        least = "more than " if others[0].is_bound else ""
        advice += f" ({least}{1e3 * others[0].seconds:.3g} ms by {others[0].method.key})"
    if delay.is_extrapolated:
        advice += ", an extrapolation"
    advice += f"; {factor:g} times the time inside is asked."
    if level == "act":
        advice += f" Pass the charge {1.0 / margin:.2g} times as fast, or shorten the passage."
    return Finding(
        level,
        f"autoignition in {name}: delay over what is asked",
        margin,
        1.0,
        "-",
        advice,
        delay.method.citation,
    )


def _flashback_values(
    charge: Charge, velocity: BurningVelocity, hydrogen: float
) -> dict[str, float | None]:
    fluctuation = flashback.TURBULENCE_INTENSITY * charge.velocity
    turbulent = flashback.hydrogen_speed_up(hydrogen) * max(
        flashback.turbulent_velocity_damkoehler(fluctuation, velocity.value),
        flashback.turbulent_velocity_zimont(
            fluctuation,
            velocity.value,
            charge.diffusivity,
            flashback.TURBULENCE_SCALE * charge.diameter,
        ),
    )
    gradient = flashback.wall_gradient(charge.velocity, charge.diameter, charge.viscosity)
    critical = flashback.critical_gradient(velocity.value, charge.diffusivity, hydrogen)
    return {
        "burning_velocity_m_s": velocity.value,
        "flashback_core_margin": charge.velocity / (flashback.core_factor(hydrogen) * turbulent),
        "flashback_wall_margin": gradient / (flashback.WALL_FACTOR * critical),
    }


def _flashback(
    name: str,
    values: Mapping[str, float | None],
    velocity: BurningVelocity,
    equivalence_ratio: float,
) -> Iterator[Finding]:
    for key, what, source in (
        ("flashback_core_margin", "core", flashback.FLASHBACK_FACTORS),
        ("flashback_wall_margin", "wall layer", flashback.CRITICAL_GRADIENT),
    ):
        margin = values[key]
        assert margin is not None
        level: Level = "act" if margin < 1.0 else "watch" if margin < AMPLE else "ok"
        advice = f"Burning velocity {velocity.value:.3g} m/s at {equivalence_ratio:.2f}."
        if velocity.notices:
            advice += f" {velocity.notices[0]}."
        if level == "act":
            advice += f" About {1.0 / margin:.2g} times the passage velocity is needed."
        yield Finding(
            level,
            f"flashback in {name}, {what}: over what is asked",
            margin,
            1.0,
            "-",
            advice,
            source.citation,
        )


def _vortex(hardware: Hardware, metal: Injector, hydrogen: float) -> Iterator[Finding]:
    swirlers: list[Swirler] = [
        opening.swirler
        for name in metal.openings
        if (opening := hardware.opening(name)).swirler is not None
    ]
    if not swirlers:
        return
    number = max(swirl_number(s.hub_diameter, s.tip_diameter, s.vane_angle) for s in swirlers)
    if number > flashback.RISKY_SWIRL and hydrogen > flashback.SWIRLED_HYDROGEN:
        yield Finding(
            "watch",
            f"flashback in {metal.name}, vortex core: cannot say",
            advice=f"{100.0 * hydrogen:.0f} % hydrogen in a passage of swirl number {number:.2f}: "
            "flames run up the core of such a vortex, and no screen here covers it.",
            source=flashback.VORTEX_CORE.citation,
        )
    elif number > flashback.RISKY_SWIRL:
        yield Finding(
            "watch",
            f"flashback in {metal.name}, vortex core: swirl number",
            number,
            flashback.RISKY_SWIRL,
            "-",
            "A hub to the end of the passage, or an axial jet on its axis, keeps the flame out; "
            "not computed.",
            flashback.VORTEX_CORE.citation,
        )
