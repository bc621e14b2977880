"""Where along the chain a liquid fuel turns to vapour."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from combustor.airflow.result import AirSplit, OpeningFlow
from combustor.base.errors import InputError, Problem
from combustor.base.method import Method, Notice
from combustor.case.schema import Atomiser
from combustor.fuel.record import Fuel, Liquid
from combustor.hardware.metal import Hardware
from combustor.rating.operating import Operating
from combustor.rating.settings import Settings
from combustor.spray.drop_size import (
    PREFILMING_AIRBLAST,
    PRESSURE_SWIRL_LEFEBVRE,
    PRESSURE_SWIRL_WANG,
    Injection,
    prefilming_airblast,
    pressure_drop_of,
    pressure_swirl_lefebvre,
    pressure_swirl_wang,
)
from combustor.spray.evaporation import (
    EFFECTIVE_CONSTANT,
    EFFECTIVE_EVAPORATION,
    ROSIN_RAMMLER,
    evaporated_spray,
)

SPRAY_UNMIXEDNESS = Method(
    key="unmixedness-spray",
    quantity="standard deviation of mixture fraction over its mean in a primary zone fed by sprays",
    source="0.4 to 0.6 and more at idle for conventional aircraft primaries (after Heywood and "
    "Mikus 1973, AGARD CP-125)",
    reading="from memory",
    validity={"unmixedness": (0.0, 0.8)},
    scatter="the calibration parameter of a machine",
    note="wider than for gas: fuel vapour leaves the drops where they are, not where air is",
)
SPRAY_WIDTH = 0.55
LATE_VAPOUR = Method(
    key="late-vapour",
    quantity="fuel still liquid at the end of the primary zone",
    source="what has not evaporated in a zone's residence time turns to vapour in the zones "
    "behind it, by their residence times, and burns with the gas that is there; what is liquid "
    "even at the end counts as unburnt vapour of the last cell",
    reading="judgement",
    note="drops travel with the gas; wall wetting and burning of single drops are left out",
)
SETTLED = 1e-5  # largest change of any place's share of vapour between two passes


@dataclass(frozen=True)
class Evaporation:
    """A spray and where it turns to vapour.

    Parameters
    ----------
    drop_size : float
        Sauter mean, m.
    constant : float
        Effective evaporation constant, m2/s.
    shares : tuple of float
        Of the fuel: in the primary zone, then in each stretch behind it. They sum to one.
    left : float
        Still liquid at the end, within the last share.
    notices : tuple of Notice
    methods : tuple of Method
    """

    drop_size: float
    constant: float
    shares: tuple[float, ...]
    left: float
    notices: tuple[Notice, ...]
    methods: tuple[Method, ...]

    def moved(self, before: Evaporation | None) -> float:
        """Return the largest change of any share since the pass before."""
        if before is None:
            return 1.0
        pairs = zip(self.shares, before.shares, strict=True)
        return max(abs(a - b) for a, b in pairs)


def for_sprays(settings: Settings, fuel: Fuel) -> Settings:
    """Return the settings with the width of sprays where none was stated for a liquid."""
    if fuel.liquid is None or settings.is_unmixedness_stated:
        return settings
    return replace(settings, unmixedness=SPRAY_WIDTH)


def evaporation_of(
    operating: Operating,
    split: AirSplit,
    hardware: Hardware,
    fuel: Fuel,
    fuel_flow: float,
    residence_times: Sequence[float],
) -> Evaporation | None:
    """Return where the fuel evaporates; None for a gas.

    Parameters
    ----------
    residence_times : sequence of float
        Of the primary zone and of each stretch behind it, s.

    Raises
    ------
    InputError
        The atomiser lacks what its correlation needs.
    """
    if fuel.liquid is None:
        return None
    atomiser = operating.atomiser or Atomiser()
    size, methods, notices = _drop_size(operating, split, hardware, fuel.liquid, fuel_flow)
    constant = atomiser.evaporation_constant or EFFECTIVE_CONSTANT
    gone, time, shares = 0.0, 0.0, []
    for step in residence_times:
        time += step
        now = evaporated_spray(size, atomiser.spread, constant, time)
        shares.append(now - gone)
        gone = now
    shares[-1] += 1.0 - gone
    range_of_constant = EFFECTIVE_EVAPORATION.notices(
        evaporation_constant=constant, pressure=operating.inlet.pressure
    )
    return Evaporation(
        size,
        constant,
        tuple(shares),
        1.0 - gone,
        (*notices, *range_of_constant),
        (*methods, EFFECTIVE_EVAPORATION, ROSIN_RAMMLER, LATE_VAPOUR, SPRAY_UNMIXEDNESS),
    )


def _drop_size(
    operating: Operating, split: AirSplit, hardware: Hardware, liquid: Liquid, fuel_flow: float
) -> tuple[float, tuple[Method, ...], tuple[Notice, ...]]:
    atomiser = operating.atomiser or Atomiser()
    if atomiser.drop_size is not None:
        return atomiser.drop_size, (), ()
    inlet = operating.inlet
    count = atomiser.count or hardware.cans
    injection = Injection(
        liquid_flow=fuel_flow / count,
        density=liquid.density,
        viscosity=liquid.viscosity,
        surface_tension=liquid.surface_tension,
        air_density=inlet.pressure / (inlet.gas_constant * inlet.temperature),
    )
    said = {
        "surface_tension": injection.surface_tension,
        "viscosity": injection.viscosity,
        "air_density": injection.air_density,
    }
    if atomiser.kind == "pressure-swirl":
        number = atomiser.flow_number
        if number is None:
            raise _lacking("flow_number")
        drop = pressure_drop_of(injection.liquid_flow, number, injection.density)
        if atomiser.orifice_diameter is None:
            notices = PRESSURE_SWIRL_LEFEBVRE.notices("", **said)
            return pressure_swirl_lefebvre(injection, drop), (PRESSURE_SWIRL_LEFEBVRE,), notices
        size = pressure_swirl_wang(injection, drop, atomiser.orifice_diameter, atomiser.spray_angle)
        return size, (PRESSURE_SWIRL_WANG,), PRESSURE_SWIRL_WANG.notices("", **said)
    return _airblast(atomiser, injection, split, hardware, fuel_flow, said)


def _airblast(
    atomiser: Atomiser,
    injection: Injection,
    split: AirSplit,
    hardware: Hardware,
    fuel_flow: float,
    said: dict[str, float],
) -> tuple[float, tuple[Method, ...], tuple[Notice, ...]]:
    swirlers = [
        (flow, opening.swirler)
        for flow, opening in zip(split.openings, hardware.openings, strict=True)
        if opening.swirler is not None and flow.mass_flow > 0.0
    ]
    air: OpeningFlow | None = swirlers[0][0] if swirlers else None
    vanes = swirlers[0][1] if swirlers else None
    ratio, velocity = atomiser.air_liquid_ratio, atomiser.air_velocity
    lip, duct = atomiser.prefilmer_diameter, atomiser.hydraulic_diameter
    if ratio is None and air is not None:
        ratio = sum(flow.mass_flow for flow, _ in swirlers) / fuel_flow
    if velocity is None and air is not None:
        velocity = air.jet_velocity
    if lip is None and vanes is not None:
        lip = vanes.hub_diameter if vanes.hub_diameter > 0.0 else 0.5 * vanes.tip_diameter
    if duct is None and vanes is not None:
        duct = vanes.tip_diameter - vanes.hub_diameter
    for key, value in (
        ("air_liquid_ratio", ratio),
        ("air_velocity", velocity),
        ("prefilmer_diameter", lip),
        ("hydraulic_diameter", duct),
    ):
        if value is None:
            raise _lacking(key)
    assert ratio is not None and velocity is not None and lip is not None and duct is not None
    size = prefilming_airblast(injection, velocity, ratio, lip, duct)
    notices = PREFILMING_AIRBLAST.notices("", **said, air_liquid_ratio=ratio)
    return size, (PREFILMING_AIRBLAST,), notices


def _lacking(key: str) -> InputError:
    return InputError(
        Problem(
            "missing, and the metal does not give it",
            key=f"fuel.atomiser.{key}",
            allowed="state it, or a drop_size of your own",
        )
    )
