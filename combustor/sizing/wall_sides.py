"""Both sides of the liner wall while sizing, as the wall balance wants them."""

from __future__ import annotations

import numpy as np

from combustor.airflow.result import Inlet
from combustor.heat.sides import AnnulusSide, GasSide
from combustor.sizing.profile import LinerProfile
from combustor.sizing.sketch import Sketch


def gas_side(
    sketch: Sketch,
    profile: LinerProfile,
    inlet: Inlet,
    fuel_flow: float,
    pressure: float,
    stoichiometric: float,
) -> GasSide:
    """Return the hot gas as the wall march wants it.

    Parameters
    ----------
    sketch : Sketch
    profile : LinerProfile
    inlet : Inlet
    fuel_flow : float
        [kg/s]
    pressure : float
        In the liner [Pa]
    stoichiometric : float
        Stoichiometric fuel per dry air [-]
    """
    station, core = profile.station, profile.core
    area = sketch.liner_area * sketch.section.cans
    return GasSide(
        station=station,
        temperature=core.temperature,
        mass_flow=profile.entered * inlet.mass_flow + fuel_flow,
        area=np.full_like(station, area),
        hydraulic_diameter=np.full_like(
            station, sketch.section.hydraulic_diameter(sketch.liner_height)
        ),
        fuel_air_ratio=core.equivalence_ratio * stoichiometric,
        pressure=pressure,
        x_h2o=core.x_h2o,
        x_co2=core.x_co2,
        recirculation_end=sketch.zone_ends[0],
    )


def annulus_side(
    sketch: Sketch, profile: LinerProfile, inlet: Inlet, front_share: float
) -> AnnulusSide:
    """Return the annulus air as the wall march wants it; at inlet temperature.

    What has not yet entered the liner passes the annulus (straight flow); in reverse flow
    what enters upstream of a station, dome included, passes it.
    """
    station = profile.station
    if sketch.flow == "straight":
        share = 1.0 - profile.entered
    else:
        share = np.maximum(profile.entered, front_share)
    # the last stretch carries the leakage only; the film there is thin but never at rest
    flow = np.maximum(share, 0.01) * inlet.mass_flow
    return AnnulusSide(
        station=station,
        mass_flow=flow,
        temperature=np.full_like(station, inlet.temperature),
        area=np.full_like(station, sketch.annulus_area * sketch.section.cans),
        hydraulic_diameter=np.full_like(station, 2.0 * sketch.annulus_gap),
    )
