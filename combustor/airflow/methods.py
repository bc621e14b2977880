"""Which published and derived methods an air split stands on."""

from __future__ import annotations

from combustor.airflow import annulus, diffuser, discharge, exit, friction, jets, liner
from combustor.airflow.collect import WALL_JETS
from combustor.airflow.openings import CROSSFLOW_EDGES
from combustor.base.method import Method
from combustor.gasdynamics import COMPRESSIBLE_ORIFICE, RAYLEIGH, SUTHERLAND_VISCOSITY
from combustor.hardware.metal import Hardware, Opening

METHODS: tuple[Method, ...] = (
    COMPRESSIBLE_ORIFICE,
    RAYLEIGH,
    SUTHERLAND_VISCOSITY,
    diffuser.DIFFUSER_LOSS,
    diffuser.DUMP_LOSS,
    diffuser.BORDA_CARNOT,
    diffuser.STALL_LIMIT,
    friction.HAALAND,
    annulus.RECOVERY,
    annulus.TURNING,
    discharge.CROSSFLOW_DISCHARGE,
    discharge.JET_ANGLE,
    discharge.DEFAULT_DISCHARGE,
    discharge.SHARP_ORIFICE,
    discharge.SWIRLER_LOSS,
    liner.LINER_MOMENTUM,
    exit.HOT_LOSS,
    jets.PENETRATION,
    jets.PENETRATION_ROW,
    jets.TRAJECTORY,
    jets.HOLE_NUMBER,
    jets.ENTRAINMENT,
)


def methods_used(hardware: Hardware) -> tuple[Method, ...]:
    """Return the methods behind the air split of this metal, in the order of the air's path."""
    used = [diffuser.DIFFUSER_LOSS, SUTHERLAND_VISCOSITY, friction.HAALAND, annulus.RECOVERY]
    if hardware.flow == "reverse":
        used.append(annulus.TURNING)
    used.append(COMPRESSIBLE_ORIFICE)
    for opening in hardware.openings:
        if opening.count > 0:
            used += _of_opening(opening, hardware)
    used += [liner.LINER_MOMENTUM, exit.HOT_LOSS]
    return tuple({method.key: method for method in used}.values())


def _of_opening(opening: Opening, hardware: Hardware) -> list[Method]:
    used = []
    law = opening.effective_area is None and opening.discharge_coefficient is None
    if opening.edge in CROSSFLOW_EDGES:
        if law:
            used.append(discharge.CROSSFLOW_DISCHARGE)
        if opening.side != "dome":
            used.append(discharge.JET_ANGLE)
    elif law and opening.edge == "swirler":
        used.append(discharge.SWIRLER_LOSS)
    elif law and opening.edge == "orifice" and opening.role not in ("effusion", "dome"):
        used.append(discharge.SHARP_ORIFICE)
    elif law:
        used.append(discharge.DEFAULT_DISCHARGE)
    if opening.role in WALL_JETS and opening.side != "dome":
        used.append(jets.PENETRATION if hardware.layout == "annular" else jets.PENETRATION_ROW)
    return used
